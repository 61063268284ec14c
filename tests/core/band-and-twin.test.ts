import { describe, expect, test } from 'vitest';
import { dealtTwin, ordinaryBand, pooledBand, residualsOf } from '../../core/index.ts';
import { differences } from './support/differences.ts';
import { analyseReference, pooledOf, rowsOf, tableOf } from './support/engine.ts';
import { DATA_SETS, referenceAnalyses, referenceAnalysis } from './support/reference.ts';

const cases = DATA_SETS.flatMap((folder) =>
  referenceAnalyses(folder).map((reference) => ({
    folder,
    reference,
    name: `${folder}, ${reference.name}`,
  })),
);

describe.each(cases)('the drawn line: $name', ({ folder, reference }) => {
  const table = tableOf(rowsOf(folder, reference));

  test('its CR2 band is that of clubSandwich on a shifted and relevelled table', () => {
    const times = [...new Set(reference.band.map((point) => point.time))];
    expect(differences(pooledBand(table, times), reference.band, 1e-6)).toEqual([]);
  });

  test('residuals are those of the fit, in order of subject and time', () => {
    const list = residualsOf(table);
    expect(list).toHaveLength(reference.structure.readings as number);
    const rss = list.reduce((sum, r) => sum + r.residual ** 2, 0);
    const df = list.length - Object.keys(reference.ols.coefficients).length;
    expect(differences(Math.sqrt(rss / df), reference.ols.sigma, 1e-9)).toEqual([]);
    for (const r of list) expect(r.fitted + r.residual).toBeCloseTo(r.response, 9);
    const seen: string[] = [];
    list.forEach((r, k) => {
      expect(table.subject[r.row]).toBe(r.subject);
      expect(table.response[r.row]).toBe(r.response);
      const previous = list[k - 1];
      if (previous?.subject !== r.subject) {
        expect(seen).not.toContain(r.subject);
        seen.push(r.subject);
      } else expect(r.time).toBeGreaterThanOrEqual(previous.time);
    });
  });

  test('the dealt twin holds the same residuals, subjects and times, dealt otherwise', () => {
    const [real, twin] = [residualsOf(table), dealtTwin(table, 4)];
    const sorted = (list: typeof real): number[] =>
      list.map((r) => r.residual).sort((a, b) => a - b);
    expect(sorted(twin)).toEqual(sorted(real));
    expect(twin.map((r) => [r.subject, r.time])).toEqual(real.map((r) => [r.subject, r.time]));
    expect(twin.map((r) => r.residual)).not.toEqual(real.map((r) => r.residual));
    expect(dealtTwin(table, 4)).toEqual(twin);
    expect(dealtTwin(table, 5)).not.toEqual(twin);
  });
});

test('the ordinary band is confint of lm: at time 0 it is the interval of the intercept', () => {
  const reference = referenceAnalysis('sleepstudy', 'unbalanced');
  const table = tableOf(rowsOf('sleepstudy', reference));
  const { estimate, lower, upper, df } = reference.ols.coefficients.intercept!;
  expect(differences(ordinaryBand(table, [0]), [{ estimate, lower, upper, df }], 1e-9)).toEqual([]);
});

test('the pooled band at time 0 is the pooled intercept', () => {
  const reference = referenceAnalysis('orthodont', 'by sex');
  const table = tableOf(rowsOf('orthodont', reference));
  const result = analyseReference('orthodont', reference, { only: ['cr'] });
  const { estimate, lower, upper, df } = pooledOf(result, 'intercept');
  expect(differences(pooledBand(table, [0])[0], { estimate, lower, upper, df }, 1e-12)).toEqual([]);
});
