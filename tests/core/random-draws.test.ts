import { describe, expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import { analyseReference, present } from './support/engine.ts';
import { DATA_SETS, referenceAnalyses, referenceAnalysis } from './support/reference.ts';

// p values by random draws agree with R's draws within 4.5 standard errors of the difference of two
// Monte Carlo shares, plus one draw on each side; enumerated ones agree exactly.
const DRAWS = 1999;

function shareError(got: number, want: number, gotDraws: number, wantDraws: number): number {
  const p = (got * gotDraws + want * wantDraws) / (gotDraws + wantDraws);
  const spread = Math.sqrt(p * (1 - p) * (1 / gotDraws + 1 / wantDraws));
  return Math.abs(got - want) / (4.5 * spread + 1 / gotDraws + 1 / wantDraws);
}

const cases = DATA_SETS.flatMap((folder) =>
  referenceAnalyses(folder).map((reference) => ({
    folder,
    reference,
    name: `${folder}, ${reference.name}`,
  })),
);

describe.each(cases)('draws against R: $name', ({ folder, reference }) => {
  const result = (): ReturnType<typeof analyseReference> =>
    analyseReference(folder, reference, { seed: 7, draws: DRAWS, only: ['check'] });

  test('residuals dealt at random, and shuffled within subject', () => {
    const independence = present(result().independence, 'independence');
    const dealt = present(independence.permutation, 'permutation');
    const want = reference.independence.permutation;
    expect(dealt.draws).toBe(DRAWS);
    expect(differences(dealt.statistic, want.statistic, 1e-6)).toEqual([]);
    expect(shareError(dealt.p, want.p, DRAWS, want.draws)).toBeLessThan(1);
    // (1 + hits) / (B + 1): a whole number of draws and never 0.
    expect(dealt.p * (DRAWS + 1)).toBeCloseTo(Math.round(dealt.p * (DRAWS + 1)), 8);
    expect(dealt.p).toBeGreaterThan(0);

    const serial = present(
      present(independence.serial, 'serial').permutation,
      'serial.permutation',
    );
    const serialWant = reference.independence.serial;
    expect(differences(serial.statistic, serialWant.lag1, 1e-6)).toEqual([]);
    expect(
      shareError(serial.p, serialWant.permutation.p, DRAWS, serialWant.permutation.draws),
    ).toBeLessThan(1);
  });
});

const enumerable = cases.filter(({ reference }) => reference.wild_bootstrap !== undefined);

describe.each(enumerable)('bootstrap against R: $name', ({ folder, reference }) => {
  test('p, statistic, weights and limits', () => {
    const result = analyseReference(folder, reference, { seed: 7, draws: DRAWS, only: ['wild'] });
    const got = present(present(result.pooled, 'pooled').wild_bootstrap, 'wild_bootstrap');
    const want = present(reference.wild_bootstrap, 'reference');
    expect(
      Object.keys(got)
        .filter((k) => !k.endsWith('_reason'))
        .sort(),
    ).toEqual(Object.keys(want).sort());
    for (const [name, expected] of Object.entries(want)) {
      const one = present(got[name], name);
      expect(one.weights).toBe(expected.weights);
      expect(differences(one.t, expected.t, 1e-6, `${name}.t`)).toEqual([]);
      const p = present(one.p, `${name}.p`);
      if (expected.exact) {
        expect(one.draws).toBe(expected.draws);
        expect(p).toBeCloseTo(expected.p, 12);
      } else {
        expect(one.draws).toBe(DRAWS);
        expect(shareError(p, expected.p, DRAWS, expected.draws)).toBeLessThan(1);
      }
      if (expected.webb_p !== undefined) {
        // R enumerates all 6^5 six-point vectors; ours is a sample of them.
        expect(shareError(present(one.webb_p, 'webb_p'), expected.webb_p, DRAWS, 1e9)).toBeLessThan(
          1,
        );
      }
      if (expected.lower !== undefined) {
        const limits = { lower: expected.lower, upper: expected.upper };
        expect(differences(one, limits, 1e-6, name)).toEqual([]);
      }
    }
  });
});

describe('seeds', () => {
  const reference = referenceAnalysis('orthodont', 'eleven by sex');
  const run = (seed: number): string =>
    JSON.stringify(analyseReference('orthodont', reference, { seed, draws: 499 }));

  test('the same seed gives the same bytes', () => {
    expect(run(3)).toBe(run(3));
  });

  test('another seed gives other draws', () => {
    expect(run(3).replace('"seed":3', '')).not.toBe(run(4).replace('"seed":4', ''));
  });

  test('leaving parts out changes no draw of the others', () => {
    const whole = analyseReference('orthodont', reference, { seed: 3, draws: 499 });
    const wildOnly = analyseReference('orthodont', reference, {
      seed: 3,
      draws: 499,
      only: ['wild'],
    });
    const checkOnly = analyseReference('orthodont', reference, {
      seed: 3,
      draws: 499,
      only: ['check'],
    });
    expect(wildOnly.pooled?.wild_bootstrap).toEqual(whole.pooled?.wild_bootstrap);
    expect(checkOnly.independence?.permutation).toEqual(whole.independence?.permutation);
    expect(checkOnly.independence?.serial).toEqual(whole.independence?.serial);
  });
});
