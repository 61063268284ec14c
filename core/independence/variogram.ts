import { quantileOfSorted } from '../table/quantile.ts';

/** A point of the sample variogram. */
export interface VariogramBin {
  /** Time apart: the lag itself, or the mean lag of the bin. */
  readonly lag: number;
  /** Mean of ½(e_ij − e_ik)² over the pairs. */
  readonly value: number;
  readonly pairs: number;
}

export interface Variogram {
  readonly bins: readonly VariogramBin[];
  /** Mean of ½(e_a − e_b)² over pairs of different subjects; null with one subject. */
  readonly total: number | null;
}

/** Up to this many distinct lags each has its own point. */
const MOST_LAGS = 15;
const BINS = 12;

/** Lags that differ by rounding only are one lag: shares of the longest lag are compared at this width. */
const SAME_LAG = 1e-9;

/** More pairs than this are not held in memory at once. */
export const MOST_PAIRS = 1e7;

interface Pairs {
  readonly lag: Float64Array;
  readonly value: Float64Array;
}

/** Pairs of readings of one subject, Σ n_i(n_i − 1)/2. */
export function pairsWithin(start: Int32Array): number {
  let count = 0;
  for (let i = 0; i < start.length - 1; i++) {
    const n = start[i + 1]! - start[i]!;
    count += (n * (n - 1)) / 2;
  }
  return count;
}

function pairsWithinSubjects(
  residuals: Float64Array,
  time: Float64Array,
  start: Int32Array,
): Pairs {
  const count = pairsWithin(start);
  const lag = new Float64Array(count);
  const value = new Float64Array(count);
  let next = 0;
  for (let i = 0; i < start.length - 1; i++) {
    for (let a = start[i]!; a < start[i + 1]!; a++) {
      for (let b = a + 1; b < start[i + 1]!; b++) {
        lag[next] = time[b]! - time[a]!;
        value[next] = 0.5 * (residuals[b]! - residuals[a]!) ** 2;
        next++;
      }
    }
  }
  return { lag, value };
}

/** Rising upper edges of the bins, each bin holding lags up to and including its edge. */
function upperEdges(lag: Float64Array): number[] {
  const sorted = Float64Array.from(lag).sort();
  const width = SAME_LAG * sorted[sorted.length - 1]!;
  const distinct: number[] = [];
  for (const value of sorted) {
    const last = distinct[distinct.length - 1];
    if (last === undefined || value - last > width) distinct.push(value);
    if (distinct.length > MOST_LAGS) break;
  }
  if (distinct.length <= MOST_LAGS) return distinct.map((value) => value + width);
  const edges: number[] = [];
  for (let k = 1; k <= BINS; k++) {
    // A lag that equals the edge but for rounding belongs to the lower bin.
    edges.push(quantileOfSorted(sorted, k / BINS) + width);
  }
  return edges;
}

function binOf(lag: number, edges: readonly number[]): number {
  let low = 0;
  let high = edges.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (lag <= edges[middle]!) high = middle;
    else low = middle + 1;
  }
  return low;
}

/**
 * The mean of ½(e_a − e_b)² over pairs of readings of different subjects, O(N); null with one subject.
 * (Diggle, Liang & Zeger: the line a variogram rises to.)
 */
export function totalVarianceLine(residuals: Float64Array, start: Int32Array): number | null {
  const n = residuals.length;
  let sum = 0;
  let squares = 0;
  let within = 0;
  let squaredCounts = 0;
  for (let i = 0; i < start.length - 1; i++) {
    let own = 0;
    let ownSquares = 0;
    for (let r = start[i]!; r < start[i + 1]!; r++) {
      own += residuals[r]!;
      ownSquares += residuals[r]! * residuals[r]!;
    }
    const count = start[i + 1]! - start[i]!;
    sum += own;
    squares += ownSquares;
    within += count * ownSquares - own * own;
    squaredCounts += count * count;
  }
  const pairs = n * n - squaredCounts;
  return pairs > 0 ? (n * squares - sum * sum - within) / pairs : null;
}

/**
 * The sample semivariogram of residuals (N) by time apart within subjects: at each distinct lag when there are at
 * most 15, else in 12 bins by type-7 quantiles of the pair lags. Null where no subject repeats, or where there are
 * more than `MOST_PAIRS` pairs.
 */
export function sampleVariogram(
  residuals: Float64Array,
  time: Float64Array,
  start: Int32Array,
): Variogram | null {
  const count = pairsWithin(start);
  if (count === 0 || count > MOST_PAIRS) return null;
  const { lag, value } = pairsWithinSubjects(residuals, time, start);
  const edges = upperEdges(lag);
  const lags = new Float64Array(edges.length);
  const values = new Float64Array(edges.length);
  const counts = new Float64Array(edges.length);
  for (let k = 0; k < lag.length; k++) {
    const bin = binOf(lag[k]!, edges);
    lags[bin]! += lag[k]!;
    values[bin]! += value[k]!;
    counts[bin]! += 1;
  }
  const bins: VariogramBin[] = [];
  counts.forEach((pairs, bin) => {
    if (pairs > 0) bins.push({ lag: lags[bin]! / pairs, value: values[bin]! / pairs, pairs });
  });
  return { bins, total: totalVarianceLine(residuals, start) };
}
