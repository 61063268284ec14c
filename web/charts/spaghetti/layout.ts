/** Where a spaghetti plot puts its marks. */
import { scaleLinear } from 'd3';
import { formatCount, formatNumber } from '../../words/numbers.ts';
import { STAMP_HEIGHT } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { domainOf, type Tick, ticksFor } from '../marks/ticks.ts';
import type { Size } from '../picture/types.ts';
import type { DrawAs, SpaghettiData, SpaghettiSubject } from './types.ts';

export type Layout = {
  x: (time: number) => number;
  y: (value: number) => number;
  left: number;
  right: number;
  top: number;
  bottom: number;
  nameAt: number;
  yTicks: Tick[];
  xTicks: Tick[];
  nTicks: Tick[];
  /** Whether zero lies on the axis; where it does not, the picture says so. */
  holdsZero: boolean;
};

/** Points of a subject's path, or the ends of its own line over its own follow-up. */
export function pathOf(
  subject: SpaghettiSubject,
  as: DrawAs,
): readonly { time: number; value: number }[] {
  if (as === 'readings') return subject.readings;
  const { own, readings } = subject;
  const first = readings[0];
  const last = readings.at(-1);
  if (!own || !first || !last) return [];
  return [first.time, last.time].map((time) => ({
    time,
    value: own.intercept + own.slope * time,
  }));
}

function* allValues(data: SpaghettiData): Generator<number> {
  for (const subject of data.subjects) for (const reading of subject.readings) yield reading.value;
  // Readings, not bands, set the scale: an unsure band must not press the readings flat.
  for (const line of data.lines) for (const point of line.points) yield point.estimate;
}

function* allTimes(data: SpaghettiData): Generator<number> {
  for (const subject of data.subjects) for (const reading of subject.readings) yield reading.time;
  for (const visit of data.visits) yield visit.time;
}

export function layoutOf(data: SpaghettiData, size: Size, stamped: boolean): Layout {
  const yDomain = domainOf(allValues(data), data.fromZero);
  let first = Number.POSITIVE_INFINITY;
  let last = Number.NEGATIVE_INFINITY;
  for (const time of allTimes(data)) {
    if (time < first) first = time;
    if (time > last) last = time;
  }
  if (!(last > first)) {
    const only = Number.isFinite(first) ? first : 0;
    first = only - 0.5;
    last = only + 0.5;
  }
  const head = stamped ? STAMP_HEIGHT : 0;
  const top = head + 28;
  const bottom = size.height - 68;
  const yTicks = ticksFor(yDomain, Math.max(3, Math.round((bottom - top) / 70)));
  const widest = Math.max(...yTicks.map((tick) => textWidth(tick.text, 13, 'mono')));
  // Room for the first n and the letter before it.
  const left = Math.max(Math.ceil(widest) + 14, 46);
  const right = size.width - 14;
  const x = scaleLinear([first, last], [left, right]);
  const y = scaleLinear(yDomain, [bottom, top]);
  const visits = readable(data.visits, x);
  const timeTicks = visits.map((visit) => ({
    at: visit.time,
    text: formatNumber(visit.time, Number.isInteger(visit.time) ? 0 : 1),
  }));
  return {
    x,
    y,
    left,
    right,
    top,
    bottom,
    nameAt: head + 13,
    yTicks,
    xTicks: timeTicks.length > 1 ? timeTicks : ticksFor([first, last], 6),
    nTicks: visits.map((visit) => ({ at: visit.time, text: formatCount(visit.n) })),
    holdsZero: yDomain[0] <= 0 && yDomain[1] >= 0,
  };
}

/** Visits whose figures fit beside each other; the first and the last always stand. */
function readable(
  visits: SpaghettiData['visits'],
  x: (time: number) => number,
): SpaghettiData['visits'] {
  const sorted = [...visits].sort((a, b) => a.time - b.time);
  const last = sorted.at(-1);
  const kept: (typeof sorted)[number][] = [];
  for (const visit of sorted) {
    const before = kept.at(-1);
    const after = last && visit !== last ? x(last.time) - x(visit.time) : Number.POSITIVE_INFINITY;
    if (before && x(visit.time) - x(before.time) < 36 && visit !== last) continue;
    if (after < 36) continue;
    if (before && visit === last && x(visit.time) - x(before.time) < 36) kept.pop();
    kept.push(visit);
  }
  return kept;
}
