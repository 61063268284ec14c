import { brentMinimum } from '../linear/brent.ts';
import type { OlsFit } from '../linear/fit-ols.ts';
import { interceptDeviance } from './intercept-deviance.ts';
import { interceptTerms } from './intercept-terms.ts';

/** A random-intercept model fitted by REML. */
export interface RandomInterceptFit {
  /** REML log-likelihood, X on the user's time scale. */
  readonly loglik: number;
  /** REML log-likelihood of the same mean model with independent errors. */
  readonly loglikIndependent: number;
  readonly varianceIntercept: number;
  readonly varianceResidual: number;
  /** At the boundary: the intercept variance is estimated as 0. */
  readonly singular: boolean;
}

/** Where the deviance is looked at first, as ρ = σ_b²/(σ_b² + σ²). */
const GRID = [
  0, 0.01, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 0.99, 0.999,
] as const;
const LARGEST = 1 - 1e-9;

/**
 * Fits the random-intercept model over ρ = θ²/(1 + θ²): grid, then Brent in the bracket to 1e-10. An interior
 * optimum no better than ρ = 0 by 1e-8 is the boundary.
 *
 * @param start G + 1 offsets of the subjects; at least one subject must repeat
 */
export function fitRandomIntercept(fit: OlsFit, start: Int32Array): RandomInterceptFit {
  const terms = interceptTerms(fit, start);
  const at = (rho: number) => interceptDeviance(terms, rho / (1 - rho)).deviance;
  const values = GRID.map(at);
  const independent = values[0]!;
  let best = 0;
  values.forEach((value, k) => {
    if (value < values[best]!) best = k;
  });
  const low = GRID[Math.max(0, best - 1)]!;
  const high = GRID[best + 1] ?? LARGEST;
  const found = brentMinimum(at, low, high, 1e-10);
  let rho = found.x;
  let deviance = found.value;
  if (values[best]! < deviance) {
    rho = GRID[best]!;
    deviance = values[best]!;
  }
  const singular = independent <= deviance + 1e-8;
  if (singular) {
    rho = 0;
    deviance = independent;
  }
  const theta = rho / (1 - rho);
  const { sigmaSquared } = interceptDeviance(terms, theta);
  return {
    loglik: -0.5 * deviance,
    loglikIndependent: -0.5 * independent,
    varianceIntercept: theta * sigmaSquared,
    varianceResidual: sigmaSquared,
    singular,
  };
}
