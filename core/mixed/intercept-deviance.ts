import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import type { InterceptTerms } from './intercept-terms.ts';

/** The profiled REML deviance at one relative covariance factor, and the residual variance that goes with it. */
export interface DevianceAt {
  readonly deviance: number;
  readonly sigmaSquared: number;
}

/**
 * −2 log-likelihood (REML) of the random-intercept model with θ² = σ_b²/σ², β and σ² profiled out, X on the
 * user's time scale (as nlme, lme4 and logLik(lm, REML = TRUE)). O(Gp²). Bates et al. 2015, for q = 1.
 *
 * ℓ = −½[(N−p) log 2πσ² + log|V/σ²| + log|X'V⁻¹X σ²| + (N−p)].
 */
export function interceptDeviance(terms: InterceptTerms, thetaSquared: number): DevianceAt {
  const { fit, k, m, e } = terms;
  const { n, p } = fit;
  // What is taken off the identity, lower triangle only: the other half is the same to the last digit.
  const taken = new Float64Array(p * p);
  const rhs = new Float64Array(p);
  let logC = 0;
  let w = fit.rss;
  for (let i = 0; i < k.length; i++) {
    const size = k[i]! * thetaSquared;
    logC += Math.log1p(size);
    const shrink = thetaSquared / (1 + size);
    if (shrink === 0) continue;
    const sum = e[i]!;
    w -= shrink * sum * sum;
    for (let x = 0; x < p; x++) {
      const left = shrink * m[i * p + x]!;
      rhs[x]! -= left * sum;
      for (let y = 0; y <= x; y++) taken[x * p + y]! += left * m[i * p + y]!;
    }
  }
  const a = Matrix.eye(p);
  for (let x = 0; x < p; x++) {
    a.set(x, x, 1 - taken[x * p + x]!);
    for (let y = 0; y < x; y++) {
      a.set(x, y, -taken[x * p + y]!);
      a.set(y, x, -taken[x * p + y]!);
    }
  }
  const factor = new CholeskyDecomposition(a);
  if (!factor.isPositiveDefinite()) {
    return { deviance: Number.POSITIVE_INFINITY, sigmaSquared: Number.NaN };
  }
  const zeta = factor.solve(Matrix.columnVector(rhs));
  let logA = 0;
  for (let x = 0; x < p; x++) {
    w -= rhs[x]! * zeta.get(x, 0);
    logA += 2 * Math.log(factor.lowerTriangularMatrix.get(x, x));
  }
  if (!(w > 0)) return { deviance: Number.POSITIVE_INFINITY, sigmaSquared: Number.NaN };
  const df = n - p;
  const sigmaSquared = w / df;
  const deviance =
    logC + logA + 2 * terms.logDetR + df * (1 + Math.log(2 * Math.PI * sigmaSquared));
  return { deviance, sigmaSquared };
}
