/**
 * The rows of one subject in a cut, from what the database holds of that subject. Pure: no clock, no
 * queries; the caller brings subjects in order of their code.
 */
import { endOfFollowUp } from '../subjects/state-steps.ts';
import type {
  CutCell,
  CutPlan,
  CutRow,
  ExclusionOfCut,
  LateReading,
  PendingVisit,
  PlannedVisitOfCut,
  ReadingOfCut,
  RowsOfSubject,
  SubjectOfCut,
} from './cut-shapes.ts';
import { addDays, daysBetween } from './days.ts';
import { numberText } from './number-text.ts';

/** The label of a visit outside the plan. */
export const UNSCHEDULED = 'unscheduled';

interface Draft extends CutRow {
  order: number;
}

/**
 * One row per visit and replicate for which a reading was due or taken, in canonical order.
 *
 * Due: the window had closed by the cutoff and the subject had not ended before it closed. A visit
 * dated after the cutoff counts as not there yet. A visit counts as pending when it was due and the
 * cut knows no outcome of it, neither readings nor a reason for missing it.
 */
export function rowsOfSubject(
  subject: SubjectOfCut,
  plan: CutPlan,
  exclusions: readonly ExclusionOfCut[],
): RowsOfSubject {
  const planById = new Map(plan.plannedVisits.map((planned) => [planned.id, planned]));
  const perVisit = new Set(plan.measures.filter((m) => m.per === 'visit').map((m) => m.shortName));
  const perSubject = new Set(
    plan.measures.filter((m) => m.per === 'subject').map((m) => m.shortName),
  );
  const readingsByVisit = new Map<string, ReadingOfCut[]>();
  const once: ReadingOfCut[] = [];
  for (const reading of subject.readings) {
    if (reading.visitId === null) {
      if (perSubject.has(reading.measure)) {
        once.push(reading);
      }
    } else if (perVisit.has(reading.measure)) {
      const list = readingsByVisit.get(reading.visitId) ?? [];
      list.push(reading);
      readingsByVisit.set(reading.visitId, list);
    }
  }

  const drafts: Draft[] = [];
  const late: LateReading[] = [];
  const pending: PendingVisit[] = [];
  let taken = 0;
  const known = new Set<string>();

  subject.visits.forEach((visit, order) => {
    if (visit.date !== null && visit.date > plan.visitCutoff) {
      return;
    }
    const planned = visit.plannedVisitId === null ? null : planById.get(visit.plannedVisitId);
    if (planned) {
      known.add(planned.id);
    }
    const readings = readingsByVisit.get(visit.id) ?? [];
    const due = planned ? windowClosed(subject, planned, plan.visitCutoff) !== null : false;
    if (readings.length === 0 && !due) {
      return;
    }
    const label = planned?.name ?? UNSCHEDULED;
    const exact = visit.date !== null && visit.precision === 'day';
    const day =
      exact && subject.baselineDate !== null
        ? daysBetween(subject.baselineDate, visit.date as string)
        : null;
    const byReplicate = new Map<number, ReadingOfCut[]>();
    for (const reading of readings) {
      const list = byReplicate.get(reading.replicate) ?? [];
      list.push(reading);
      byReplicate.set(reading.replicate, list);
    }
    if (byReplicate.size === 0) {
      byReplicate.set(1, []);
    }
    for (const [replicate, ofReplicate] of byReplicate) {
      const draft = newDraft(subject, planned ?? null, day, replicate, order);
      for (const reading of ofReplicate) {
        const left = reasonToLeaveOut(exclusions, reading.measure, label);
        draft.cells.set(reading.measure, cellOf(reading, left));
        if (left !== null) {
          continue;
        }
        taken += 1;
        const days = exact ? daysBetween(visit.date as string, reading.enteredDay) : 0;
        if (days > plan.lateDays) {
          late.push({
            subjectCode: subject.code,
            visit: label,
            measure: reading.measure,
            visitDate: visit.date as string,
            enteredAt: reading.enteredAt,
            days,
          });
        }
      }
      drafts.push(draft);
    }
  });

  for (const planned of plan.plannedVisits) {
    const closed = known.has(planned.id) ? null : windowClosed(subject, planned, plan.visitCutoff);
    if (closed !== null) {
      pending.push({ subjectCode: subject.code, visit: planned.name, windowClosed: closed });
      drafts.push(newDraft(subject, planned, null, 1, subject.visits.length));
    }
  }

  for (const reading of once) {
    let used = false;
    for (const draft of drafts) {
      const left = reasonToLeaveOut(exclusions, reading.measure, draft.visit);
      used = used || left === null;
      draft.cells.set(reading.measure, cellOf(reading, left));
    }
    taken += used ? 1 : 0;
  }

  drafts.sort(canonicalOrder);
  return { rows: drafts, readings: taken, late, pending };
}

/** The last day of the window when the visit was due by the cutoff, else null. */
function windowClosed(
  subject: SubjectOfCut,
  planned: PlannedVisitOfCut,
  cutoff: string,
): string | null {
  if (subject.baselineDate === null) {
    return null;
  }
  const lastDay = addDays(subject.baselineDate, planned.targetDay + planned.windowAfter);
  if (lastDay > cutoff) {
    return null;
  }
  const end = endOfFollowUp(subject.state, subject.stateDate);
  return end !== null && end < lastDay ? null : lastDay;
}

function newDraft(
  subject: SubjectOfCut,
  planned: PlannedVisitOfCut | null,
  day: number | null,
  replicate: number,
  order: number,
): Draft {
  return {
    subject: subject.code,
    site: subject.site,
    visit: planned?.name ?? UNSCHEDULED,
    planned: planned !== null,
    day,
    plannedDay: planned?.targetDay ?? null,
    replicate,
    group: subject.group,
    cells: new Map(),
    order,
  };
}

function reasonToLeaveOut(
  exclusions: readonly ExclusionOfCut[],
  measure: string,
  visit: string,
): string | null {
  const hit = exclusions.find(
    (exclusion) =>
      (exclusion.measure === null || exclusion.measure === measure) &&
      (exclusion.visit === null || exclusion.visit === visit),
  );
  return hit?.reason ?? null;
}

function cellOf(reading: ReadingOfCut, leftOut: string | null): CutCell {
  if (leftOut !== null) {
    return { text: '', note: `excluded: ${leftOut}` };
  }
  if (reading.limitSign !== null && reading.limitValue !== null) {
    return { text: '', note: `${reading.limitSign}${numberText(reading.limitValue)}` };
  }
  if (reading.notDone !== null) {
    return { text: '', note: `not done: ${reading.notDone}` };
  }
  if (reading.choice !== null) {
    return { text: reading.choice, note: '' };
  }
  return { text: reading.value === null ? '' : numberText(reading.value), note: '' };
}

/** Empty days last by planned day; then planned before unscheduled, name, replicate, order of entry. */
function canonicalOrder(a: Draft, b: Draft): number {
  if (a.day !== b.day) {
    return emptyLast(a.day, b.day);
  }
  if (a.day === null && a.plannedDay !== b.plannedDay) {
    return emptyLast(a.plannedDay, b.plannedDay);
  }
  if (a.planned !== b.planned) {
    return a.planned ? -1 : 1;
  }
  if (a.visit !== b.visit) {
    return a.visit < b.visit ? -1 : 1;
  }
  return a.replicate - b.replicate || a.order - b.order;
}

function emptyLast(a: number | null, b: number | null): number {
  if (a === null) {
    return 1;
  }
  return b === null ? -1 : a - b;
}
