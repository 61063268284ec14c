import { chiSquaredUpper } from '../distributions/chi-squared.ts';
import type { RandomInterceptFit } from '../mixed/fit-random-intercept.ts';

/** Below this a likelihood ratio is 0. */
const NOTHING = 1e-6;

export interface BoundaryTest {
  readonly lr: number;
  readonly p: number;
}

/**
 * A variance component against none: p = ½P(χ²₁ > LR), and 1 when LR is 0, since the value tested lies on the
 * boundary (Self & Liang 1987).
 */
export function boundaryTest(richer: number, poorer: number): BoundaryTest {
  const lr = 2 * (richer - poorer);
  return lr < NOTHING ? { lr: 0, p: 1 } : { lr, p: 0.5 * chiSquaredUpper(lr, 1) };
}

/** The likelihood ratio of a random intercept against none, both REML with the same mean model. */
export function interceptTest(fit: RandomInterceptFit): BoundaryTest {
  return boundaryTest(fit.loglik, fit.loglikIndependent);
}
