import { describe, expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import { analyseReference, present, type Result } from './support/engine.ts';
import { holes } from './support/no-holes.ts';
import { DATA_SETS, type ReferenceAnalysis, referenceAnalyses } from './support/reference.ts';

// Every number that R gives for an analysis, from tests/reference/<data set>/expected.json.
const CLOSED_FORM = 1e-6;

const cases = DATA_SETS.flatMap((folder) =>
  referenceAnalyses(folder).map((reference) => ({
    folder,
    reference,
    name: `${folder}, ${reference.name}`,
  })),
);

const cache = new Map<string, Result>();
function resultOf(folder: string, reference: ReferenceAnalysis): Result {
  const key = `${folder}/${reference.name}`;
  const held = cache.get(key);
  if (held) return held;
  const result = analyseReference(folder, reference);
  cache.set(key, result);
  return result;
}

describe.each(cases)('against R: $name', ({ folder, reference }) => {
  test('structure', () => {
    expect(differences(resultOf(folder, reference).structure, reference.structure, 0)).toEqual([]);
  });

  test('ordinary least squares (lm)', () => {
    const { ols } = resultOf(folder, reference);
    expect(differences(present(ols, 'ols'), reference.ols, CLOSED_FORM)).toEqual([]);
  });

  test('cluster-robust errors, df, p and intervals (clubSandwich)', () => {
    const pooled = present(resultOf(folder, reference).pooled, 'pooled');
    expect(Object.keys(pooled.coefficients ?? {}).sort()).toEqual(
      Object.keys(reference.pooled.coefficients).sort(),
    );
    expect(differences(pooled, reference.pooled, CLOSED_FORM)).toEqual([]);
  });

  test('ANOVA, ICC with interval, design effect, ratios of errors', () => {
    const independence = present(resultOf(folder, reference).independence, 'independence');
    const { anova, icc_residual, icc_response, design_effect, effective_n, se_ratio, moulton } =
      reference.independence;
    const want = {
      anova,
      icc_residual,
      icc_response,
      design_effect,
      effective_n,
      se_ratio,
      moulton,
    };
    expect(differences(independence, want, CLOSED_FORM)).toEqual([]);
  });

  test('likelihood ratio of the random intercept (lme4, nlme)', () => {
    const independence = present(resultOf(folder, reference).independence, 'independence');
    const got = present(independence.lr_test, 'lr_test');
    const want = reference.independence.lr_test;
    expect(Math.abs(got.lr - want.lr)).toBeLessThan(2e-4);
    // The tail of chi-squared turns an absolute 2e-4 of the ratio into a relative 1e-4 of p.
    expect(differences(got.p, want.p, 3e-4)).toEqual([]);
  });

  test('successive residuals and variogram (plain loops in R)', () => {
    const independence = present(resultOf(folder, reference).independence, 'independence');
    const { lag1, lag1_expected } = reference.independence.serial;
    expect(differences(independence.serial, { lag1, lag1_expected }, CLOSED_FORM)).toEqual([]);
    expect(
      differences(independence.variogram, reference.independence.variogram, CLOSED_FORM),
    ).toEqual([]);
  });

  test("each subject's own line (lm by subject)", () => {
    const got = present(resultOf(folder, reference).per_subject, 'per_subject');
    const { not_fitted, ...want } = reference.per_subject;
    expect(differences(got, want, CLOSED_FORM)).toEqual([]);
    expect(got.not_fitted.map((s) => s.subject)).toEqual(not_fitted);
  });

  test('time split within and between subjects (clubSandwich)', () => {
    const got = present(resultOf(folder, reference).within_between, 'within_between');
    expect(differences(got, reference.within_between, CLOSED_FORM)).toEqual([]);
  });

  test('no NaN, no Infinity, no null without a reason, and JSON gives it back', () => {
    const result = resultOf(folder, reference);
    expect(holes(result)).toEqual([]);
    expect(JSON.parse(JSON.stringify(result))).toEqual(result);
  });
});
