import { Matrix } from 'ml-matrix';
import { describe, expect, test } from 'vitest';
import { fitOls } from '../../core/linear/fit-ols.ts';
import { fitRandomIntercept } from '../../core/mixed/fit-random-intercept.ts';
import { differences } from './support/differences.ts';

// lme4::Dyestuff (Davies & Goldsmith 1972, table 6.3) and lme4::Dyestuff2 (Box & Tiao 1973, invented):
// six batches of five yields and no covariate. REML by lme4 1.1-31; for a balanced table it is the
// method of moments where that is positive: residual MSW, between (MSB - MSW)/5.
const DYESTUFF = [
  1545, 1440, 1440, 1520, 1580, 1540, 1555, 1490, 1560, 1495, 1595, 1550, 1605, 1510, 1560, 1445,
  1440, 1595, 1465, 1545, 1595, 1630, 1515, 1635, 1625, 1520, 1455, 1450, 1480, 1445,
];
const DYESTUFF2 = [
  7.298, 3.846, 2.434, 9.566, 7.99, 5.22, 6.556, 0.608, 11.788, -0.892, 0.11, 10.386, 13.434, 5.51,
  8.166, 2.212, 4.852, 7.092, 9.288, 4.98, 0.282, 9.014, 4.458, 9.446, 7.198, 1.722, 4.782, 8.106,
  0.758, 3.758,
];
const BATCHES = Int32Array.from([0, 5, 10, 15, 20, 25, 30]);

const fitted = (yields: number[]) => {
  const design = {
    names: ['intercept'],
    columns: [new Float64Array(yields.length).fill(1)],
    toUser: Matrix.eye(1),
  };
  return fitRandomIntercept(fitOls(design, Float64Array.from(yields)), BATCHES);
};

describe('random intercept by REML', () => {
  test('Dyestuff: 1764.05 and 2451.25', () => {
    const fit = fitted(DYESTUFF);
    expect(differences(fit.varianceIntercept, 1764.05, 1e-7)).toEqual([]);
    expect(differences(fit.varianceResidual, 2451.25, 1e-7)).toEqual([]);
    expect(fit.loglik).toBeCloseTo(-159.827138421129, 8);
    expect(fit.singular).toBe(false);
  });

  test('Dyestuff2: the between variance is exactly 0, criterion 161.83', () => {
    const fit = fitted(DYESTUFF2);
    expect(fit.varianceIntercept).toBe(0);
    expect(fit.singular).toBe(true);
    expect(-2 * fit.loglik).toBeCloseTo(161.8282778122, 8);
    expect(fit.loglik).toBe(fit.loglikIndependent);
  });
});
