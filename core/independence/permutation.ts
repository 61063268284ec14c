import { RandomStream } from '../random/stream.ts';
import { successiveProducts, withinDeviations } from './serial.ts';

/** A draw within this share of the observed statistic counts as reaching it. */
const TIE = 1e-12;

/** Σ n_i ē_i²: with the residuals fixed it orders the draws as MSB/MSW does, at O(N) each. */
function betweenSum(values: Float64Array, start: Int32Array): number {
  let sum = 0;
  for (let i = 0; i < start.length - 1; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    let total = 0;
    for (let r = from; r < to; r++) total += values[r]!;
    sum += (total * total) / (to - from);
  }
  return sum;
}

/**
 * p of the permutation test of likeness within subjects: the residuals (N, mean 0) are dealt at random over all
 * readings, keeping every n_i. (1 + #{T* ≥ T})/(B + 1).
 */
export function permuteOverSubjects(
  residuals: Float64Array,
  start: Int32Array,
  draws: number,
  seed: number,
): number {
  const observed = betweenSum(residuals, start) * (1 - TIE);
  const stream = new RandomStream(seed, 'permutation over subjects');
  const dealt = new Float64Array(residuals.length);
  let reached = 0;
  for (let draw = 0; draw < draws; draw++) {
    stream.start(draw);
    dealt.set(residuals);
    stream.shuffle(dealt, 0, dealt.length);
    if (betweenSum(dealt, start) >= observed) reached++;
  }
  return (1 + reached) / (draws + 1);
}

/**
 * p of the permutation test of serial order: residuals are shuffled within each subject, statistic lag-1. It asks
 * only about order, not about likeness. (1 + #{T* ≥ T})/(B + 1).
 */
export function permuteWithinSubjects(
  residuals: Float64Array,
  start: Int32Array,
  draws: number,
  seed: number,
): number {
  const { d, denominator } = withinDeviations(residuals, start);
  // Every order keeps the denominator, so numerators are compared; ties are judged on its scale.
  const observed = successiveProducts(d, start) - TIE * denominator;
  const stream = new RandomStream(seed, 'permutation within subjects');
  const shuffled = new Float64Array(d.length);
  let reached = 0;
  for (let draw = 0; draw < draws; draw++) {
    stream.start(draw);
    shuffled.set(d);
    for (let i = 0; i < start.length - 1; i++) {
      const from = start[i]!;
      const count = start[i + 1]! - from;
      if (count > 1) stream.shuffle(shuffled, from, count);
    }
    if (successiveProducts(shuffled, start) >= observed) reached++;
  }
  return (1 + reached) / (draws + 1);
}

/** The residuals (N) dealt at random to subjects, keeping every n_i: the twin that shows what chance looks like. */
export function dealResiduals(residuals: Float64Array, seed: number): Float64Array {
  const stream = new RandomStream(seed, 'dealt twin');
  const dealt = Float64Array.from(residuals);
  stream.shuffle(dealt, 0, dealt.length);
  return dealt;
}
