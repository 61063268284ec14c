/** Where the marks of a cord lie. Shares of the width, so that a cord needs no measuring. */
import type { CordScale, CordState, CordVisit } from './types.ts';

/** Heights inside a cord's row, in px. */
export const CORD = { height: 34, line: 13, bracket: 25, word: 29, gap: 6 } as const;

const TAKES_PLACE: ReadonlySet<CordState> = new Set(['done', 'partly done', 'unscheduled']);

/** The day at which a knot stands: when it took place, else when it was planned. */
export function knotDay(visit: CordVisit): number | null {
  return TAKES_PLACE.has(visit.state) ? (visit.day ?? visit.targetDay) : visit.targetDay;
}

/** A window is shown while it asks something of somebody, or where a visit fell outside it. */
export function hasBracket(visit: CordVisit): boolean {
  if (visit.windowFrom === null || visit.windowTo === null) return false;
  if (visit.windowTo <= visit.windowFrom) return false;
  return (
    visit.outOfWindow ||
    visit.state === 'open' ||
    visit.state === 'closing' ||
    visit.state === 'overdue'
  );
}

/** The share of the width at a day, in per cent, kept inside the cord. */
export function placeOf(day: number, scale: CordScale): number {
  const width = scale.to - scale.from;
  if (width <= 0) return 0;
  return Math.min(100, Math.max(0, ((day - scale.from) / width) * 100));
}

/** One scale for a list of cords: from the earliest day to the latest anybody has. */
export function cordScale(
  cords: readonly {
    visits: readonly CordVisit[];
    today?: number | null;
    endedAt?: number | null;
  }[],
): CordScale {
  let from = 0;
  let to = 1;
  for (const cord of cords) {
    for (const visit of cord.visits) {
      const at = knotDay(visit);
      if (at !== null) {
        from = Math.min(from, at);
        to = Math.max(to, at);
      }
      if (hasBracket(visit)) to = Math.max(to, visit.windowTo ?? to);
    }
    if (typeof cord.endedAt === 'number') to = Math.max(to, cord.endedAt);
  }
  return { from, to };
}

export type CordRuns = {
  /** Follow-up that has been: solid. */
  solid: { from: number; to: number } | null;
  /** Follow-up that may yet be: dotted. */
  dotted: { from: number; to: number } | null;
};

/** The solid part ends today or where follow-up ended; the dotted part runs on to the last planned visit. */
export function cordRuns(
  visits: readonly CordVisit[],
  today: number | null,
  endedAt: number | null,
  scale: CordScale,
): CordRuns {
  const days = visits.map(knotDay).filter((at) => at !== null);
  if (days.length === 0 && endedAt === null) return { solid: null, dotted: null };
  const first = Math.min(0, ...days);
  const last = Math.max(first, ...days);
  if (endedAt !== null) {
    // A reading dated after the end of follow-up still hangs on the cord.
    const happened = visits
      .filter((visit) => TAKES_PLACE.has(visit.state))
      .map(knotDay)
      .filter((at) => at !== null);
    const end = Math.max(endedAt, ...happened);
    return { solid: { from: placeOf(first, scale), to: placeOf(end, scale) }, dotted: null };
  }
  const now = today ?? last;
  const turn = Math.max(first, now);
  const solid =
    now > first
      ? { from: placeOf(first, scale), to: placeOf(Math.min(turn, scale.to), scale) }
      : null;
  const dotted = last > turn ? { from: placeOf(turn, scale), to: placeOf(last, scale) } : null;
  return { solid, dotted };
}

/** Visits that a cord still shows: after the end of follow-up nothing is upcoming. */
export function drawnVisits(
  visits: readonly CordVisit[],
  endedAt: number | null,
): readonly CordVisit[] {
  return visits.filter((visit) => {
    const at = knotDay(visit);
    if (at === null) return false;
    return endedAt === null || at <= endedAt || TAKES_PLACE.has(visit.state);
  });
}
