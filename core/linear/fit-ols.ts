import type { Matrix } from 'ml-matrix';
import { StatsError } from '../errors.ts';
import { type Design, userR } from './design.ts';
import { dot, meanOf, shiftAndScale } from './kernels.ts';
import { project, thinQr } from './thin-qr.ts';
import { solveUpper, solveUpperTransposed } from './triangular.ts';

/** RSS at or below this share of Σy² is rounding: the readings lie on the line. (64 ε)². */
const NO_VARIANCE = (64 * 2 ** -52) ** 2;

/** An ordinary least-squares fit: the base of everything clustered, and of the locked ordinary table. */
export interface OlsFit {
  readonly names: readonly string[];
  readonly n: number;
  readonly p: number;
  /** p columns of N, orthonormal. */
  readonly q: readonly Float64Array[];
  /** R of X = QR on the user's scale (p × p, upper triangular). */
  readonly r: Matrix;
  /** p coefficients on the user's scale. */
  readonly beta: Float64Array;
  /** N residuals; exact zeros where there is no residual variance. */
  readonly residuals: Float64Array;
  readonly rss: number;
  /** Σ(y − ȳ)². */
  readonly tss: number;
  /** RSS/(N − p). */
  readonly sigmaSquared: number;
  /** Whether the readings are not all on the line, to working precision. */
  readonly hasVariance: boolean;
}

/**
 * Fits y (N) on a design by QR, never by normal equations on raw X.
 *
 * The response is centred first, so that readings far from zero keep the digits of their differences.
 *
 * @throws StatsError too_few_readings where N ≤ p, collinear where a column is determined by the earlier ones
 */
export function fitOls(design: Design, response: Float64Array): OlsFit {
  const n = response.length;
  const p = design.names.length;
  if (n <= p) throw new StatsError('too_few_readings', { readings: n, parameters: p });
  const { q, r: rCentred } = thinQr(design.columns, design.names);
  const r = userR(rCentred, design);
  const mean = meanOf(response);
  const centred = shiftAndScale(response, mean, 1);
  const sumOfSquares = dot(response, response);
  const tss = dot(centred, centred);
  const { along, residuals } = project(q, centred);
  const beta = solveUpper(r, along);
  beta[0]! += mean;
  let rss = dot(residuals, residuals);
  const hasVariance = rss > NO_VARIANCE * sumOfSquares;
  if (!hasVariance) {
    residuals.fill(0);
    rss = 0;
  }
  const constant = tss <= NO_VARIANCE * sumOfSquares;
  return {
    names: design.names,
    n,
    p,
    q,
    r,
    beta,
    residuals,
    rss,
    tss: constant ? 0 : tss,
    sigmaSquared: rss / (n - p),
    hasVariance,
  };
}

/** h = R⁻ᵀl (p) of a contrast l (p, on the user's scale): l'β̂ = h'Q'y and its ordinary variance is σ²h'h. */
export function contrastDirection(fit: OlsFit, contrast: ArrayLike<number>): Float64Array {
  return solveUpperTransposed(fit.r, contrast);
}

/** The p unit vectors, one a coefficient, as directions h. */
export function coefficientDirections(fit: OlsFit): Float64Array[] {
  return fit.names.map((_, k) => {
    const unit = new Float64Array(fit.p);
    unit[k] = 1;
    return contrastDirection(fit, unit);
  });
}

/** The ordinary standard error of a contrast in direction h, √(σ²h'h). */
export function ordinaryError(fit: OlsFit, h: Float64Array): number {
  let sum = 0;
  for (const x of h) sum += x * x;
  return Math.sqrt(fit.sigmaSquared * sum);
}
