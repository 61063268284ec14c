/** Enrolling subjects and changing their state. */
import { Site, Subject } from '../../../database/entities/index.ts';
import { codeSchema } from '../../contracts/setup.ts';
import type { SubjectState } from '../../contracts/subjects.ts';
import { Problem } from '../../http/problems.ts';
import { holdSubject } from './find-subject.ts';
import { STATE_STEPS } from './state-steps.ts';
import { type StudyAct, todayAt } from './study-act.ts';

export interface EnrolSubjectInput {
  siteCode: string;
  code: string;
  /** Screening may come before consent; enrolment never does. */
  state: 'screening' | 'enrolled';
  consentVersion: string | null;
  consentDate: string | null;
  /** The day of enrolment; today at the site when left out. */
  enrolmentDate?: string | null;
  baselineDate: string | null;
}

/** @throws Problem `subject_site_unknown`, `subject_code_taken`, or what is wrong with a date */
export async function enrolSubject(act: StudyAct, input: EnrolSubjectInput): Promise<Subject> {
  const { manager } = act.tx;
  if (!codeSchema.safeParse(input.code).success) {
    throw new Problem('subject_code_form', { subject: input.code });
  }
  const site = await manager
    .getRepository(Site)
    .findOneBy({ studyId: act.study.id, code: input.siteCode });
  if (!site || (act.siteIds !== null && !act.siteIds.includes(site.id))) {
    throw new Problem('subject_site_unknown', { site: input.siteCode });
  }
  const today = todayAt(act, site.timeZone);
  const enrolled = input.state === 'enrolled';
  const enrolmentDate = enrolled ? (input.enrolmentDate ?? today) : null;
  checkDates(today, { ...input, enrolmentDate });

  // The unique key decides, also between two who enrol at the same moment.
  const inserted: { id: string }[] = await manager.query(
    `INSERT INTO subject (study_id, site_id, code, consent_version, consent_date, enrolment_date,
                          baseline_date, state, state_date, created_at, created_by)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11)
     ON CONFLICT (study_id, code) DO NOTHING RETURNING id`,
    [
      act.study.id,
      site.id,
      input.code,
      input.consentVersion,
      input.consentDate,
      enrolmentDate,
      input.baselineDate,
      input.state,
      enrolmentDate ?? today,
      act.now,
      act.accountId,
    ],
  );
  const id = inserted[0]?.id;
  if (id === undefined) {
    throw new Problem('subject_code_taken', { subject: input.code });
  }
  const subject = await manager.getRepository(Subject).findOneByOrFail({ id });
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: enrolled ? 'subject enrolled' : 'subject screened',
    entity: 'subject',
    entityUid: subject.uid,
    after: {
      code: subject.code,
      site: site.code,
      state: subject.state,
      consentVersion: subject.consentVersion,
      consentDate: subject.consentDate,
      enrolmentDate,
      baselineDate: subject.baselineDate,
    },
  });
  return subject;
}

function checkDates(
  today: string,
  input: Pick<
    EnrolSubjectInput,
    'state' | 'consentVersion' | 'consentDate' | 'baselineDate' | 'enrolmentDate'
  >,
): void {
  const { consentDate } = input;
  if (input.state === 'enrolled' && (consentDate === null || !input.consentVersion)) {
    throw new Problem('subject_consent_missing');
  }
  const dates: [string, string | null | undefined][] = [
    ['consent date', consentDate],
    ['enrolment date', input.enrolmentDate],
    ['baseline date', input.baselineDate],
  ];
  for (const [what, date] of dates) {
    if (date && date > today) {
      throw new Problem('subject_date_future', { what, date, today });
    }
    if (date && consentDate !== null && date < consentDate) {
      throw new Problem('subject_before_consent', { what, date, consent: consentDate });
    }
  }
}

export interface ChangeStateInput {
  subjectCode: string;
  state: SubjectState;
  /** The day it happened. */
  date: string;
  reason: string;
  /** Needed when a screened subject is enrolled. */
  enrolment?: { consentVersion: string; consentDate: string; baselineDate: string | null };
  /** Version that was read; left out by the loader of the demo, which is alone. */
  version?: number;
}

/**
 * @throws Problem `subject_state_step` where the step is not one of STATE_STEPS, `stale_version`, or what
 * is wrong with the date or the reason
 */
export async function changeSubjectState(act: StudyAct, input: ChangeStateInput): Promise<Subject> {
  const subject = await holdSubject(act, input.subjectCode);
  if (input.version !== undefined && input.version !== subject.version) {
    throw new Problem('stale_version', { given: input.version, held: subject.version });
  }
  const possible = STATE_STEPS[subject.state];
  if (!possible.includes(input.state)) {
    throw new Problem('subject_state_step', {
      from: subject.state,
      to: input.state,
      possible: possible.join(', ') || 'none',
    });
  }
  if (input.reason.trim() === '') {
    throw new Problem('subject_reason_missing', { to: input.state });
  }
  const today = todayAt(act, subject.site.timeZone);
  const enrols = input.state === 'enrolled' && subject.consentDate === null;
  const consentVersion = input.enrolment?.consentVersion ?? subject.consentVersion;
  const consentDate = input.enrolment?.consentDate ?? subject.consentDate;
  const baselineDate = input.enrolment?.baselineDate ?? subject.baselineDate;
  if (input.state === 'enrolled') {
    checkDates(today, { state: 'enrolled', consentVersion, consentDate, baselineDate });
  }
  const what = 'date of the change';
  if (input.date > today) {
    throw new Problem('subject_date_future', { what, date: input.date, today });
  }
  if (consentDate !== null && input.date < consentDate) {
    throw new Problem('subject_before_consent', { what, date: input.date, consent: consentDate });
  }

  const before = stateFields(subject);
  subject.state = input.state;
  subject.stateDate = input.date;
  subject.stateReason = input.reason.trim();
  subject.version += 1;
  if (enrols || input.enrolment) {
    Object.assign(subject, { consentVersion, consentDate, baselineDate });
  }
  if (input.state === 'enrolled' && subject.enrolmentDate === null) {
    subject.enrolmentDate = input.date;
  }
  await act.tx.manager.getRepository(Subject).save(subject);
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: 'subject state changed',
    entity: 'subject',
    entityUid: subject.uid,
    before,
    after: stateFields(subject),
    reason: input.reason.trim(),
  });
  return subject;
}

function stateFields(subject: Subject) {
  const { state, stateDate, consentVersion, consentDate, enrolmentDate, baselineDate, version } =
    subject;
  return { state, stateDate, consentVersion, consentDate, enrolmentDate, baselineDate, version };
}
