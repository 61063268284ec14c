/** What a quantile search needs of a distribution on (0, ∞). */
export interface Tail {
  /** The tail probability beyond (rising = false) or up to (rising = true) x, accurate relative to itself. */
  readonly probability: (x: number) => number;
  /** The density at x. */
  readonly density: (x: number) => number;
  readonly rising: boolean;
}

/**
 * The x > 0 whose tail probability is p, 0 < p < 1.
 *
 * Newton steps on log p against log x, where tails of t and F are nearly straight, kept inside a bracket that
 * only shrinks; a step that leaves it is replaced by bisection. Ends when x no longer moves by 1e-15.
 */
export function invertTail(tail: Tail, p: number, start: number): number {
  const target = Math.log(p);
  const direction = tail.rising ? 1 : -1;
  let low = Number.NEGATIVE_INFINITY;
  let high = Number.POSITIVE_INFINITY;
  let u = Math.log(start);
  for (let step = 0; step < 400; step++) {
    const x = Math.exp(u);
    const probability = tail.probability(x);
    const gap = direction * (Math.log(probability) - target);
    if (gap === 0) return x;
    if (gap < 0) low = u;
    else high = u;
    const slope = (tail.density(x) * x) / probability;
    let next = u - gap / slope;
    if (!(next > low && next < high && Math.abs(next - u) < 20)) {
      if (low === Number.NEGATIVE_INFINITY) next = u - 2;
      else if (high === Number.POSITIVE_INFINITY) next = u + 2;
      else next = 0.5 * (low + high);
    }
    if (Math.abs(next - u) <= 1e-15 * Math.max(1, Math.abs(u))) return Math.exp(next);
    u = next;
  }
  return Math.exp(u);
}
