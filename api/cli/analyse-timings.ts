import { type Observe, type TimedPart, timedParts } from '../../core/index.ts';

/** Parts that this version of the engine does not have: their time is null, not nought. */
const NOT_BUILT: readonly TimedPart[] = [
  'lmm_random_intercept',
  'lmm_random_slope',
  'gee_exchangeable',
  'gee_ar1',
  'assumptions',
];

export interface Timings {
  readonly observe: Observe;
  /** Milliseconds by part so far, and since the process began. */
  readonly report: () => Record<string, number | null>;
}

/** Times parts by the wall; a part inside another counts once, as the inner one. */
export function createTimings(): Timings {
  const spent = new Map<TimedPart, number>();
  const inner: number[] = [];
  const observe: Observe = (part, run) => {
    inner.push(0);
    const from = performance.now();
    const value = run();
    const whole = performance.now() - from;
    const own = whole - (inner.pop() ?? 0);
    spent.set(part, (spent.get(part) ?? 0) + own);
    if (inner.length > 0) inner[inner.length - 1]! += whole;
    return value;
  };
  return {
    observe,
    report: () => ({
      ...Object.fromEntries(
        timedParts.map((part) => [part, spent.get(part) ?? (NOT_BUILT.includes(part) ? null : 0)]),
      ),
      total: performance.now(),
    }),
  };
}
