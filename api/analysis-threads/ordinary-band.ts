/** The band of an ordinary straight line: t limits with the error that takes readings as independent. */
import { studentQuantile } from '../../core/distributions/student-t.ts';

export interface LinePoint {
  group: string | null;
  time: number;
  estimate: number;
  lower: number | null;
  upper: number | null;
  df: number | null;
}

interface Moments {
  n: number;
  time: number;
  response: number;
  spread: number;
  cross: number;
}

/**
 * With treatment-coded groups and their products with time each group has a line of its own, and only
 * the residual variance is common: at time t the squared error of group g is
 * s² (1/n_g + (t − t̄_g)²/Σ(t − t̄_g)²), on N − p df.
 *
 * @param readings used readings only
 * @param sigma residual standard deviation of the ordinary fit
 * @param df N − p
 * @param times on the scale of the readings
 */
export function ordinaryBand(
  readings: readonly { time: number; response: number; group: string | null }[],
  sigma: number,
  df: number,
  times: readonly number[],
): LinePoint[] {
  const points: LinePoint[] = [];
  const quantile = studentQuantile(0.975, df);
  for (const [group, moments] of momentsByGroup(readings)) {
    const slope = moments.cross / moments.spread;
    for (const time of times) {
      const away = time - moments.time;
      const estimate = moments.response + slope * away;
      const half = quantile * sigma * Math.sqrt(1 / moments.n + (away * away) / moments.spread);
      const known = Number.isFinite(half);
      points.push({
        group,
        time,
        estimate,
        lower: known ? estimate - half : null,
        upper: known ? estimate + half : null,
        df,
      });
    }
  }
  return points;
}

/** Means first and then sums about them, so that far times and large responses lose no digits. */
function momentsByGroup(
  readings: readonly { time: number; response: number; group: string | null }[],
): Map<string | null, Moments> {
  const groups = new Map<string | null, Moments>();
  for (const { time, response, group } of readings) {
    const sums = groups.get(group) ?? { n: 0, time: 0, response: 0, spread: 0, cross: 0 };
    sums.n += 1;
    sums.time += time;
    sums.response += response;
    groups.set(group, sums);
  }
  for (const sums of groups.values()) {
    sums.time /= sums.n;
    sums.response /= sums.n;
  }
  for (const { time, response, group } of readings) {
    const sums = groups.get(group);
    if (sums) {
      sums.spread += (time - sums.time) ** 2;
      sums.cross += (time - sums.time) * (response - sums.response);
    }
  }
  return groups;
}
