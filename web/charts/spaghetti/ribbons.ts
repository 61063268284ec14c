/** Many subjects at once: quantiles of the readings at each planned visit, and who lies furthest out. */
import { ascending, quantileSorted } from 'd3';
import type { SpaghettiData } from './types.ts';

export type RibbonPoint = {
  time: number;
  n: number;
  low: number;
  lower: number;
  middle: number;
  upper: number;
  high: number;
};

/** Quantiles (type 7) at 5, 25, 50, 75 and 95 % of the readings taken at each visit. */
export function ribbonsOf(data: SpaghettiData): RibbonPoint[] {
  const values = new Map<string, number[]>(data.visits.map((visit) => [visit.name, []]));
  for (const subject of data.subjects)
    for (const reading of subject.readings) values.get(reading.visit)?.push(reading.value);
  const points: RibbonPoint[] = [];
  for (const visit of [...data.visits].sort((a, b) => a.time - b.time)) {
    const sorted = (values.get(visit.name) ?? []).sort(ascending);
    if (sorted.length === 0) continue;
    const at = (share: number) => quantileSorted(sorted, share) ?? 0;
    points.push({
      time: visit.time,
      n: sorted.length,
      low: at(0.05),
      lower: at(0.25),
      middle: at(0.5),
      upper: at(0.75),
      high: at(0.95),
    });
  }
  return points;
}

/**
 * Subjects whose readings lie furthest from the middle of their visits: the mean over a subject's
 * readings of (value − median) ÷ (interquartile range ÷ 1.349), more than three either way.
 */
export function outlyingOf(data: SpaghettiData, most = 6): string[] {
  const byTime = new Map(ribbonsOf(data).map((point) => [point.time, point]));
  const timeOf = new Map(data.visits.map((visit) => [visit.name, visit.time]));
  const scored: { id: string; score: number }[] = [];
  for (const subject of data.subjects) {
    let sum = 0;
    let count = 0;
    for (const reading of subject.readings) {
      const point = byTime.get(timeOf.get(reading.visit) ?? Number.NaN);
      const spread = point ? (point.upper - point.lower) / 1.349 : 0;
      if (!point || spread <= 0) continue;
      sum += (reading.value - point.middle) / spread;
      count += 1;
    }
    if (count > 0) scored.push({ id: subject.id, score: Math.abs(sum / count) });
  }
  return scored
    .filter((each) => each.score > 3)
    .sort((a, b) => b.score - a.score)
    .slice(0, most)
    .map((each) => each.id);
}
