/** Logging visits with their readings, and saying why a planned one was missed. */
import {
  type ContactMode,
  type DatePrecision,
  MISSED_REASONS,
  type MissedReason,
  PlannedVisit,
  Visit,
} from '../../../database/entities/index.ts';
import { Problem } from '../../http/problems.ts';
import { addDays } from '../cuts/days.ts';
import { type NewReading, storeReadings } from '../readings/store-readings.ts';
import { holdSubject, type SubjectWithSite } from '../subjects/find-subject.ts';
import { NO_VISIT_AFTER } from '../subjects/state-steps.ts';
import { type StudyAct, todayAt } from '../subjects/study-act.ts';

export interface LogVisitInput {
  subjectCode: string;
  /** Name of the planned visit; null: unscheduled. An unscheduled visit never fills a planned place. */
  planned: string | null;
  /** For an unscheduled visit only. */
  unscheduledReason?: string | null;
  date: string;
  /** A partial date stands as its first possible day. */
  datePrecision?: DatePrecision;
  contactMode: ContactMode;
  /** At this visit; measures taken once per subject are kept with the subject. */
  readings: readonly NewReading[];
}

/** A date outside the window is kept as it is: the visit then shows as out of its window. */
export async function logVisit(act: StudyAct, input: LogVisitInput): Promise<Visit> {
  const subject = await holdSubject(act, input.subjectCode);
  checkDate(act, subject, input.date);
  const planned = await placeOf(act, subject, input.planned);
  const unscheduledReason = planned ? null : input.unscheduledReason?.trim() || null;
  if (!planned && unscheduledReason === null) {
    throw new Problem('visit_reason_missing');
  }
  const visit = await act.tx.manager.getRepository(Visit).save({
    studyId: act.study.id,
    subjectId: subject.id,
    plannedVisitId: planned?.id ?? null,
    unscheduledReason,
    date: input.date,
    datePrecision: input.datePrecision ?? 'day',
    contactMode: input.contactMode,
    createdAt: act.now,
    createdBy: act.accountId,
  });
  const place = { subjectId: subject.id, visitId: visit.id };
  const readings = await storeReadings(act, place, input.readings);
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: 'visit logged',
    entity: 'visit',
    entityUid: visit.uid,
    after: {
      subject: subject.code,
      visit: planned?.name ?? 'unscheduled',
      unscheduledReason,
      date: input.date,
      datePrecision: visit.datePrecision,
      contactMode: input.contactMode,
      readings,
    },
  });
  return visit as Visit;
}

export interface MissVisitInput {
  subjectCode: string;
  planned: string;
  reason: MissedReason;
  /** Needed for `other`. */
  reasonText?: string | null;
}

/** @throws Problem `visit_not_due` before the window of the visit has opened */
export async function missVisit(act: StudyAct, input: MissVisitInput): Promise<Visit> {
  const subject = await holdSubject(act, input.subjectCode);
  refuseNotEnrolled(subject);
  const planned = await placeOf(act, subject, input.planned);
  const missedText = input.reasonText?.trim() || null;
  if (!MISSED_REASONS.includes(input.reason) || (input.reason === 'other' && missedText === null)) {
    throw new Problem('visit_missed_reason');
  }
  if (planned && subject.baselineDate !== null) {
    const opens = addDays(subject.baselineDate, planned.targetDay - planned.windowBefore);
    if (todayAt(act, subject.site.timeZone) < opens) {
      throw new Problem('visit_not_due', { visit: planned.name, opens });
    }
  }
  const visit = await act.tx.manager.getRepository(Visit).save({
    studyId: act.study.id,
    subjectId: subject.id,
    plannedVisitId: planned?.id ?? null,
    missedReason: input.reason,
    missedText,
    createdAt: act.now,
    createdBy: act.accountId,
  });
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: 'visit missed',
    entity: 'visit',
    entityUid: visit.uid,
    after: { subject: subject.code, visit: planned?.name, reason: input.reason, missedText },
    reason: missedText ? `${input.reason}: ${missedText}` : input.reason,
  });
  return visit as Visit;
}

function refuseNotEnrolled(subject: SubjectWithSite): void {
  if (subject.state === 'screening' || subject.state === 'screen failed') {
    throw new Problem('subject_not_enrolled', { subject: subject.code, state: subject.state });
  }
}

function checkDate(act: StudyAct, subject: SubjectWithSite, date: string): void {
  refuseNotEnrolled(subject);
  const what = 'visit date';
  const today = todayAt(act, subject.site.timeZone);
  if (date > today) {
    throw new Problem('subject_date_future', { what, date, today });
  }
  if (subject.consentDate !== null && date < subject.consentDate) {
    throw new Problem('subject_before_consent', { what, date, consent: subject.consentDate });
  }
  const ended = NO_VISIT_AFTER.has(subject.state) ? subject.stateDate : null;
  if (ended !== null && date > ended) {
    const { code, state } = subject;
    throw new Problem('subject_ended', { subject: code, state, ended, date });
  }
}

/** @throws Problem `visit_plan_unknown` or, where the place is taken, `visit_logged_already` */
async function placeOf(
  act: StudyAct,
  subject: SubjectWithSite,
  name: string | null,
): Promise<PlannedVisit | null> {
  if (name === null) {
    return null;
  }
  const { manager } = act.tx;
  const planned = await manager
    .getRepository(PlannedVisit)
    .findOneBy({ studyId: act.study.id, name });
  if (!planned) {
    throw new Problem('visit_plan_unknown', { visit: name });
  }
  const held = await manager
    .getRepository(Visit)
    .findOneBy({ subjectId: subject.id, plannedVisitId: planned.id });
  if (held) {
    throw new Problem('visit_logged_already', {
      visit: name,
      subject: subject.code,
      held: held.date ?? `missed: ${held.missedReason}`,
    });
  }
  return planned;
}
