/**
 * The type-7 quantile (Hyndman & Fan 1996) of values already in rising order, 0 ≤ p ≤ 1; NaN when there are none.
 */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  const n = sorted.length;
  if (n === 0) return Number.NaN;
  const position = (n - 1) * p;
  const below = Math.floor(position);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, n - 1)]!;
  return low + (position - below) * (high - low);
}

/** The type-7 quantile of values in any order; they are left as they are. */
export function quantile(values: ArrayLike<number>, p: number): number {
  return quantileOfSorted(Float64Array.from(values).sort(), p);
}
