/** Puts a subject's cord together from what is planned and what was logged. Pure. */
import type { Cord, CordVisit, SubjectState } from '../../contracts/subjects.ts';
import { daysBetween } from '../cuts/days.ts';
import {
  dayOfVisit,
  type FollowUp,
  type LoggedVisit,
  type PlannedWindow,
  plannedVisitState,
} from '../visits/visit-state.ts';
import { endOfFollowUp } from './state-steps.ts';

export interface PlannedOfStudy extends PlannedWindow {
  id: string;
  uid: string;
  name: string;
}

export interface LoggedOfSubject extends LoggedVisit {
  id: string;
  uid: string;
  /** Null: unscheduled. */
  plannedVisitId: string | null;
}

export interface SubjectOfCord {
  state: SubjectState;
  stateDate: string | null;
  baselineDate: string | null;
}

export const UNSCHEDULED = 'unscheduled';

/** A knot with the inner key of its visit, so that readings can be hung on it. */
export interface Knot extends CordVisit {
  visitKey: string | null;
}

export interface BuiltCord extends Omit<Cord, 'visits'> {
  visits: Knot[];
}

/** @param today the calendar day at the subject's site */
export function buildCord(
  subject: SubjectOfCord,
  planned: readonly PlannedOfStudy[],
  logged: readonly LoggedOfSubject[],
  today: string,
  closingDays: number,
): BuiltCord {
  const { baselineDate, state, stateDate } = subject;
  const followUp: FollowUp = {
    baselineDate,
    today,
    endDate: endOfFollowUp(state, stateDate),
    closingDays,
  };
  const byPlan = new Map(logged.map((visit) => [visit.plannedVisitId, visit]));
  const knots = [
    ...planned.map((plan) => plannedKnot(plan, followUp, byPlan.get(plan.id) ?? null)),
    ...logged
      .filter((visit) => visit.plannedVisitId === null)
      .map((visit) => unscheduledKnot(visit, baselineDate)),
  ];
  knots.sort((a, b) => a.at - b.at);
  const ended = followUp.endDate !== null;
  return {
    today: baselineDate === null ? null : daysBetween(baselineDate, today),
    end: ended
      ? {
          word: state,
          day:
            baselineDate === null || stateDate === null
              ? null
              : daysBetween(baselineDate, stateDate),
        }
      : null,
    visits: knots.map(({ at: _at, ...knot }) => knot),
  };
}

/** `at`: where the knot sits on the cord, also while nothing took place or the date is partial. */
type PlacedKnot = Knot & { at: number };

function plannedKnot(
  plan: PlannedOfStudy,
  followUp: FollowUp,
  visit: LoggedOfSubject | null,
): PlacedKnot {
  const found = plannedVisitState(plan, followUp, visit);
  return {
    visitKey: visit?.id ?? null,
    id: visit?.uid ?? null,
    plannedVisitId: plan.uid,
    name: plan.name,
    targetDay: plan.targetDay,
    ...found,
    at: found.day ?? plan.targetDay,
  };
}

function unscheduledKnot(visit: LoggedOfSubject, baselineDate: string | null): PlacedKnot {
  const day = dayOfVisit(baselineDate, visit);
  const partial =
    baselineDate !== null && visit.date !== null ? daysBetween(baselineDate, visit.date) : 0;
  return {
    visitKey: visit.id,
    id: visit.uid,
    plannedVisitId: null,
    name: UNSCHEDULED,
    state: 'unscheduled',
    targetDay: null,
    windowFrom: null,
    windowTo: null,
    day,
    outOfWindow: false,
    afterEnd: false,
    at: day ?? partial,
  };
}

/** Planned visits that took place, and those whose window has opened while they were due. */
export function countVisits(cord: BuiltCord): { visitsDone: number; visitsDue: number } {
  const planned = cord.visits.filter((visit) => visit.plannedVisitId !== null);
  return {
    visitsDone: planned.filter(({ state }) => state === 'done' || state === 'partly done').length,
    visitsDue: planned.filter(({ state }) => state !== 'upcoming').length,
  };
}

/** Without the inner keys, which never leave the server. */
export function cordView({ today, end, visits }: BuiltCord): Cord {
  return { today, end, visits: visits.map(({ visitKey: _key, ...knot }) => knot) };
}
