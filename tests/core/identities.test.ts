import { describe, expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import {
  analyseReference,
  analyseRows,
  pooledOf,
  present,
  type Result,
  type Row,
  rowsOf,
} from './support/engine.ts';
import { referenceAnalysis } from './support/reference.ts';

// What algebra says of special tables, independent of any reference implementation.

describe('a balanced table with the same times for all (sleepstudy)', () => {
  const result = analyseReference('sleepstudy', referenceAnalysis('sleepstudy', 'full'), {
    draws: 199,
  });

  test.each(['intercept', 'time'])(
    '%s: CR1 = CR2, CR3 = CR2 G/(G-1) to a root, df = G - 1',
    (name) => {
      const c = pooledOf(result, name);
      // I - S_i has the eigenvalue 1 - 1/G twice: CR2 is CR0 G/(G-1), CR3 is CR0 (G/(G-1))^2.
      expect(differences(c.se_cr2, present(c.se_cr1, 'cr1'), 1e-12)).toEqual([]);
      expect(differences(c.se_cr2, present(c.se_cr0, 'cr0') * Math.sqrt(18 / 17), 1e-12)).toEqual(
        [],
      );
      expect(differences(c.se_cr3, present(c.se_cr0, 'cr0') * (18 / 17), 1e-12)).toEqual([]);
      expect(differences(c.df, 17, 1e-10)).toEqual([]);
    },
  );

  test('the errors are those that maximum likelihood and REML give the random slope', () => {
    // Bates et al. 2015 print 6.825 and 1.546 (REML); ML 6.63228, 1.50224 (computed in R).
    expect(pooledOf(result, 'intercept').se_cr0).toBeCloseTo(6.63228, 5);
    expect(pooledOf(result, 'time').se_cr0).toBeCloseTo(1.50224, 5);
    expect(pooledOf(result, 'intercept').se_cr2).toBeCloseTo(6.82456, 5);
    expect(pooledOf(result, 'time').se_cr2).toBeCloseTo(1.54579, 5);
    expect(pooledOf(result, 'intercept').se_cr3).toBeCloseTo(7.02241, 5);
    expect(pooledOf(result, 'time').se_cr3).toBeCloseTo(1.5906, 5);
  });

  test('the pooled slope is the mean of the own slopes, and so are its error and interval', () => {
    const own = present(result.per_subject, 'per_subject');
    const slope = pooledOf(result, 'time');
    const want = {
      mean_slope: slope.estimate,
      sd_slope: present(slope.se_cr2, 'se') * Math.sqrt(18),
      mean_slope_lower: slope.lower,
      mean_slope_upper: slope.upper,
    };
    expect(differences(own, want, 1e-10)).toEqual([]);
  });

  test("Moulton's factor: 1 - ICC for a within slope, 1 + (n - 1) ICC for the mean", () => {
    const i = present(result.independence, 'independence');
    const icc = present(i.icc_residual, 'icc').estimate;
    // A slope on times that are the same for all has no part between subjects.
    expect(differences(i.moulton?.time, Math.sqrt(1 - icc), 1e-12)).toEqual([]);
    expect(i.design_effect).toBeCloseTo(1 + 9 * icc, 12);
    expect(i.effective_n).toBeCloseTo(180 / (1 + 9 * icc), 10);
    expect(differences(i.serial?.lag1_expected, -1 / 9, 1e-12)).toEqual([]);
  });

  test('the variogram gives back the variance: its pairs add up to the sum of squares within', () => {
    const i = present(result.independence, 'independence');
    const bins = present(i.variogram, 'variogram').bins;
    const pairs = bins.reduce((sum, b) => sum + b.pairs, 0);
    const total = bins.reduce((sum, b) => sum + b.pairs * b.value, 0);
    expect(pairs).toBe((18 * 10 * 9) / 2);
    // Sum over pairs of (a - b)^2/2 is n/2 times the sum of squares about the mean, n = 10.
    const within = present(i.anova, 'anova').msw * (180 - 18);
    expect(differences(total, (10 / 2) * within, 1e-10)).toEqual([]);
  });
});

test('two groups: the same lines and errors as each group alone', () => {
  const reference = referenceAnalysis('orthodont', 'by sex');
  const rows = rowsOf('orthodont', reference);
  const both = analyseRows(rows, { only: ['cr'] });
  const alone = (sex: string): Result =>
    analyseRows(
      rows.filter((row) => row[3] === sex).map(([subject, t, y]): Row => [subject, t, y]),
      { only: ['cr'] },
    );
  const girls = pooledOf(alone('Female'), 'time');
  const boys = pooledOf(alone('Male'), 'time');
  expect(pooledOf(both, 'time').estimate).toBeCloseTo(girls.estimate, 10);
  expect(differences(pooledOf(both, 'time').se_cr2, girls.se_cr2, 1e-10)).toEqual([]);
  const difference = pooledOf(both, 'time_by_group');
  expect(difference.estimate).toBeCloseTo(boys.estimate - girls.estimate, 10);
  const error = Math.hypot(present(girls.se_cr2, 'girls'), present(boys.se_cr2, 'boys'));
  expect(differences(difference.se_cr2, error, 1e-10)).toEqual([]);
  // Welch and Satterthwaite with equal error variances: 16 boys and 11 girls, same four ages.
  const df = (1 / 16 + 1 / 11) ** 2 / (1 / (16 ** 2 * 15) + 1 / (11 ** 2 * 10));
  expect(differences(difference.df, df, 1e-10)).toEqual([]);
});
