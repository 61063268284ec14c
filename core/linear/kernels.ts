/**
 * The few loops over all readings, kept in one place: shared by everything that runs over long columns they are
 * compiled once and early, which is most of the time of a single fit.
 */

/** Σ a_k b_k. */
export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k]! * b[k]!;
  return sum;
}

/** Adds factor · x to y, in place. */
export function addMultiple(y: Float64Array, factor: number, x: Float64Array): void {
  for (let k = 0; k < y.length; k++) y[k]! += factor * x[k]!;
}

/** (x − centre) · factor, as a new column. */
export function shiftAndScale(x: Float64Array, centre: number, factor: number): Float64Array {
  const moved = new Float64Array(x.length);
  for (let k = 0; k < x.length; k++) moved[k] = (x[k]! - centre) * factor;
  return moved;
}

/** The mean, summed as differences from the first value so that values far from zero keep their digits. */
export function meanOf(x: Float64Array): number {
  const origin = x[0]!;
  let sum = 0;
  for (let k = 0; k < x.length; k++) sum += x[k]! - origin;
  return origin + sum / x.length;
}
