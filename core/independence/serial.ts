import { quantile } from '../table/quantile.ts';

/** The correlation of successive residuals within subjects. */
export interface SuccessiveCorrelation {
  readonly lag1: number;
  /** Its mean when the order within each subject is random. */
  readonly expected: number;
}

/** d_ij = e_ij − ē_i for all readings (N), and the denominator Σ S_i (n_i − 1)/n_i of lag-1. */
export interface WithinDeviations {
  readonly d: Float64Array;
  readonly denominator: number;
  readonly expected: number;
}

/** Deviations of residuals (N) from their subject's mean; `start` holds the G + 1 offsets. */
export function withinDeviations(residuals: Float64Array, start: Int32Array): WithinDeviations {
  const d = new Float64Array(residuals.length);
  let denominator = 0;
  let numerator = 0;
  for (let i = 0; i < start.length - 1; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    const n = to - from;
    if (n < 2) continue;
    const origin = residuals[from]!;
    let mean = 0;
    for (let r = from; r < to; r++) mean += (residuals[r]! - origin) / n;
    let squares = 0;
    for (let r = from; r < to; r++) {
      d[r] = residuals[r]! - origin - mean;
      squares += d[r]! * d[r]!;
    }
    denominator += (squares * (n - 1)) / n;
    numerator -= squares / n;
  }
  return { d, denominator, expected: denominator > 0 ? numerator / denominator : Number.NaN };
}

/** Σ_iΣ_j d_ij d_i,j+1: products never cross from one subject to the next. */
export function successiveProducts(d: Float64Array, start: Int32Array): number {
  let sum = 0;
  for (let i = 0; i < start.length - 1; i++) {
    const to = start[i + 1]!;
    for (let r = start[i]! + 1; r < to; r++) sum += d[r - 1]! * d[r]!;
  }
  return sum;
}

/**
 * Lag-1 of the residuals within subjects, beside its mean under no serial order, −1/(n − 1) when balanced; null
 * where no subject's residuals differ. Rows of different subjects are never neighbours.
 */
export function successiveCorrelation(
  residuals: Float64Array,
  start: Int32Array,
): SuccessiveCorrelation | null {
  const { d, denominator, expected } = withinDeviations(residuals, start);
  if (!(denominator > 0)) return null;
  return { lag1: successiveProducts(d, start) / denominator, expected };
}

/** The median gap between successive distinct times of a subject, in units of time; null where there is none. */
export function medianGap(time: Float64Array, start: Int32Array): number | null {
  const gaps: number[] = [];
  for (let i = 0; i < start.length - 1; i++) {
    for (let r = start[i]! + 1; r < start[i + 1]!; r++) {
      const gap = time[r]! - time[r - 1]!;
      if (gap > 0) gaps.push(gap);
    }
  }
  return gaps.length > 0 ? quantile(gaps, 0.5) : null;
}
