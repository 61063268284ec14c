import type { GroupedTable } from '../table/long-table.ts';

/** Time split into what differs between subjects and what changes within them. */
export interface TimeSplit {
  /** N deviations t − t̄_i. */
  readonly within: Float64Array;
  /** N subject means t̄_i. */
  readonly between: Float64Array;
  /** Whether any subject has two different times. */
  readonly hasWithin: boolean;
  /** Whether the subject means differ by more than rounding. */
  readonly hasBetween: boolean;
}

/** Means whose range is at most this share of the range of the times agree. */
const SAME_MEANS = 1e-9;

/** Splits the times of the used readings (Neuhaus & Kalbfleisch 1998). */
export function splitTime({ time, start }: GroupedTable): TimeSplit {
  const n = time.length;
  const within = new Float64Array(n);
  const between = new Float64Array(n);
  const range = { low: Number.POSITIVE_INFINITY, high: Number.NEGATIVE_INFINITY };
  const means = { low: Number.POSITIVE_INFINITY, high: Number.NEGATIVE_INFINITY };
  let hasWithin = false;
  for (let i = 0; i < start.length - 1; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    const origin = time[from]!;
    let sum = 0;
    for (let r = from; r < to; r++) sum += time[r]! - origin;
    const mean = origin + sum / (to - from);
    for (let r = from; r < to; r++) {
      within[r] = time[r]! - mean;
      between[r] = mean;
    }
    if (time[to - 1]! > origin) hasWithin = true;
    else within.fill(0, from, to);
    range.low = Math.min(range.low, origin);
    range.high = Math.max(range.high, time[to - 1]!);
    means.low = Math.min(means.low, mean);
    means.high = Math.max(means.high, mean);
  }
  const hasBetween = means.high - means.low > SAME_MEANS * (range.high - range.low);
  return { within, between, hasWithin, hasBetween };
}
