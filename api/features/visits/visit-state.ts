/**
 * The state of a planned visit, worked out here and nowhere else. Pure: calendar days in, words out.
 *
 * Days are counted on the calendar of the subject's site, so a change of the clock there moves nothing.
 */
import type { VisitState } from '../../contracts/subjects.ts';
import { addDays, daysBetween } from '../cuts/days.ts';

export interface PlannedWindow {
  /** Days from baseline, which is day 0. */
  targetDay: number;
  windowBefore: number;
  windowAfter: number;
}

/** What was logged for a planned visit. */
export interface LoggedVisit {
  date: string | null;
  datePrecision: 'day' | 'month' | 'year';
  missed: boolean;
  /** Measures due at the visit: all that are read at visits, less those found not applicable there. */
  measuresDue: number;
  /** Of those, the ones with a value, a choice or a limit. */
  measuresTaken: number;
}

export interface FollowUp {
  baselineDate: string | null;
  /** The calendar day at the subject's site. */
  today: string;
  /** The day follow-up ended; null while it goes on. */
  endDate: string | null;
  /** How many days before a window ends an open visit counts as closing. */
  closingDays: number;
}

export interface PlannedVisitState {
  state: Exclude<VisitState, 'unscheduled'>;
  windowFrom: number;
  windowTo: number;
  /** Null where the visit did not take place, or its date is partial. */
  day: number | null;
  outOfWindow: boolean;
  /** Nothing was logged and follow-up had ended before the window closed: no longer due. */
  afterEnd: boolean;
}

export function plannedVisitState(
  planned: PlannedWindow,
  followUp: FollowUp,
  logged: LoggedVisit | null,
): PlannedVisitState {
  const windowFrom = planned.targetDay - planned.windowBefore;
  const windowTo = planned.targetDay + planned.windowAfter;
  const day = dayOfVisit(followUp.baselineDate, logged);
  const outOfWindow = day !== null && (day < windowFrom || day > windowTo);
  const base = { windowFrom, windowTo, day, outOfWindow, afterEnd: false };
  if (logged) {
    return { ...base, state: stateOfLogged(logged) };
  }
  if (followUp.baselineDate === null) {
    return { ...base, state: 'upcoming', afterEnd: followUp.endDate !== null };
  }
  const closes = addDays(followUp.baselineDate, windowTo);
  if (followUp.endDate !== null && followUp.endDate < closes) {
    return { ...base, state: 'upcoming', afterEnd: true };
  }
  const today = daysBetween(followUp.baselineDate, followUp.today);
  return { ...base, state: stateOfWaiting(today, windowFrom, windowTo, followUp.closingDays) };
}

/** A visit where nothing could be taken counts as missed, although somebody came. */
function stateOfLogged(logged: LoggedVisit): 'done' | 'partly done' | 'missed' {
  if (logged.missed) {
    return 'missed';
  }
  if (logged.measuresTaken >= logged.measuresDue) {
    return 'done';
  }
  return logged.measuresTaken > 0 ? 'partly done' : 'missed';
}

function stateOfWaiting(
  today: number,
  windowFrom: number,
  windowTo: number,
  closingDays: number,
): 'upcoming' | 'open' | 'closing' | 'overdue' {
  if (today < windowFrom) {
    return 'upcoming';
  }
  if (today > windowTo) {
    return 'overdue';
  }
  // The last `closingDays` days of the window, its last day among them.
  return today > windowTo - closingDays ? 'closing' : 'open';
}

/** Days from baseline to a visit; null for a partial date, which names no day. */
export function dayOfVisit(
  baselineDate: string | null,
  visit: { date: string | null; datePrecision: 'day' | 'month' | 'year' } | null,
): number | null {
  if (baselineDate === null || visit === null || visit.date === null) {
    return null;
  }
  return visit.datePrecision === 'day' ? daysBetween(baselineDate, visit.date) : null;
}
