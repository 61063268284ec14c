import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { verifyChains } from '../../api/audit/verify.ts';
import { correctReading } from '../../api/features/readings/service.ts';
import type { EnrolSubjectInput } from '../../api/features/subjects/service.ts';
import { changeSubjectState, enrolSubject } from '../../api/features/subjects/service.ts';
import type { LogVisitInput } from '../../api/features/visits/service.ts';
import { logVisit, missVisit } from '../../api/features/visits/service.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { makeSmallStudy, NOW, type SmallStudy } from './subjects-study.ts';

let database: TestDatabase;
let study: SmallStudy;
let code: string;
let serial = 0;

beforeAll(async () => {
  database = await createTestDatabase();
  study = await makeSmallStudy(database);
});
afterAll(() => database.drop());

const enrolment = (over: Partial<EnrolSubjectInput> = {}): EnrolSubjectInput => ({
  siteCode: 'NOR',
  code,
  state: 'enrolled',
  consentVersion: '1.2',
  consentDate: '2026-09-28',
  enrolmentDate: '2026-09-28',
  baselineDate: '2026-10-01',
  ...over,
});
const enrol = (over: Partial<EnrolSubjectInput> = {}) =>
  study.act('coordinator', (act) => enrolSubject(act, enrolment(over)));
const log = (over: Partial<LogVisitInput> = {}) =>
  study.act('coordinator', (act) =>
    logVisit(act, {
      subjectCode: code,
      planned: 'Baseline',
      date: '2026-10-01',
      contactMode: 'in person',
      readings: [],
      ...over,
    }),
  );
const refused = (problem: string, params: object = {}) => ({
  code: problem,
  params: expect.objectContaining(params),
});
const countRows = async () => {
  const [row] = await database.query<Record<string, string>>(
    `SELECT (SELECT count(*) FROM subject) AS subjects, (SELECT count(*) FROM visit) AS visits,
            (SELECT count(*) FROM reading) AS readings, (SELECT count(*) FROM reading_revision) AS revisions,
            (SELECT count(*) FROM audit.entry) AS entries`,
  );
  return row;
};

beforeEach(() => {
  serial += 1;
  code = `N${String(serial).padStart(3, '0')}`;
  study.clock.now = NOW;
});

describe('enrolling', () => {
  it('keeps the subject and says so in the trail', async () => {
    const subject = await enrol();
    expect(subject).toMatchObject({ code, state: 'enrolled', stateDate: '2026-09-28', version: 1 });
    const entries = await database.query(
      `SELECT action, role_then, after->>'code' AS code FROM audit.entry WHERE entity_uid = $1`,
      [subject.uid],
    );
    expect(entries).toEqual([{ action: 'subject enrolled', role_then: 'coordinator', code }]);
  });

  it.each([
    ['subject_site_unknown', { siteCode: 'SOU' }],
    ['subject_site_unknown', { siteCode: 'nowhere' }],
    ['subject_consent_missing', { consentVersion: null }],
    ['subject_consent_missing', { consentDate: null }],
    ['subject_date_future', { consentDate: '2026-12-02', baselineDate: null }],
    ['subject_date_future', { baselineDate: '2026-12-02' }],
    ['subject_code_form', { code: '=A1' }],
    ['subject_before_consent', { baselineDate: '2026-09-27' }],
    ['subject_before_consent', { enrolmentDate: '2026-09-27' }],
  ])('is refused with %s for %j, and nothing stays', async (problem, over) => {
    const before = await countRows();
    await expect(enrol(over)).rejects.toMatchObject(refused(problem));
    expect(await countRows()).toEqual(before);
  });

  it('refuses a code that is in use, also at another site', async () => {
    await enrol();
    await expect(
      study.act('owner', (act) => enrolSubject(act, enrolment({ siteCode: 'SOU' }))),
    ).rejects.toMatchObject(refused('subject_code_taken', { subject: code }));
  });

  it('lets one of two who take a code at once through', async () => {
    const results = await Promise.allSettled([enrol(), enrol()]);
    const lost = results.filter((result) => result.status === 'rejected');
    expect(lost.map((result) => result.reason.code)).toEqual(['subject_code_taken']);
  });

  it('takes the day from the wall of the site', async () => {
    // At noon UTC on 1 December it is already 2 December in Auckland.
    const subject = await study.act('owner', (act) =>
      enrolSubject(
        act,
        enrolment({ siteCode: 'SOU', baselineDate: '2026-12-02', enrolmentDate: null }),
      ),
    );
    expect(subject.enrolmentDate).toBe('2026-12-02');
  });

  it('keeps who was screened and failed', async () => {
    await enrol({
      state: 'screening',
      consentVersion: null,
      consentDate: null,
      baselineDate: null,
    });
    const failed = await study.act('coordinator', (act) =>
      changeSubjectState(act, {
        subjectCode: code,
        state: 'screen failed',
        date: '2026-11-30',
        reason: 'younger than 60',
      }),
    );
    expect(failed).toMatchObject({ state: 'screen failed', stateReason: 'younger than 60' });
    await expect(log()).rejects.toMatchObject(refused('subject_not_enrolled'));
  });
});

describe('changing the state', () => {
  beforeEach(() => enrol());
  const change = (state: 'died' | 'completed' | 'screening' | 'consent withdrawn', over = {}) =>
    study.act('coordinator', (act) =>
      changeSubjectState(act, {
        subjectCode: code,
        state,
        date: '2026-11-20',
        reason: 'told by phone',
        ...over,
      }),
    );

  it('keeps the state before and after with the reason', async () => {
    const subject = await change('consent withdrawn');
    expect(subject).toMatchObject({ state: 'consent withdrawn', version: 2 });
    const [entry] = await database.query(
      `SELECT before->>'state' AS before, after->>'state' AS after, reason FROM audit.entry
        WHERE entity_uid = $1 ORDER BY seq DESC LIMIT 1`,
      [subject.uid],
    );
    expect(entry).toEqual({
      before: 'enrolled',
      after: 'consent withdrawn',
      reason: 'told by phone',
    });
  });

  it('refuses steps that lead nowhere, and a visit dated after the end', async () => {
    await expect(change('screening')).rejects.toMatchObject(refused('subject_state_step'));
    await change('died');
    await expect(change('completed')).rejects.toMatchObject(
      refused('subject_state_step', { possible: 'none' }),
    );
    await expect(log({ planned: 'Week 8', date: '2026-11-26' })).rejects.toMatchObject(
      refused('subject_ended', { ended: '2026-11-20' }),
    );
    await log({ planned: 'Week 4', date: '2026-10-29' });
  });

  it('refuses an empty reason, a date to come, one before consent, and a stale version', async () => {
    const before = await countRows();
    await expect(change('died', { reason: '  ' })).rejects.toMatchObject(
      refused('subject_reason_missing'),
    );
    await expect(change('died', { date: '2026-12-02' })).rejects.toMatchObject(
      refused('subject_date_future'),
    );
    await expect(change('died', { date: '2026-09-01' })).rejects.toMatchObject(
      refused('subject_before_consent'),
    );
    await expect(change('died', { version: 7 })).rejects.toMatchObject(
      refused('stale_version', { given: 7, held: 1 }),
    );
    expect(await countRows()).toEqual(before);
  });
});

describe('logging a visit', () => {
  beforeEach(() => enrol());

  it('keeps values, limits and what was not done, and once per subject with the subject', async () => {
    const visit = await log({
      readings: [
        { measure: 'sway', value: 61.5 },
        { measure: 'sway', replicate: 2, limit: { sign: '<', value: 20 } },
        { measure: 'falls', notDone: 'subject refused' },
        { measure: 'sex', choice: 'f' },
      ],
    });
    const rows = await database.query(
      `SELECT m.short_name, r.replicate, r.value, r.choice, r.limit_sign, r.limit_value, r.not_done,
              r.visit_id IS NULL AS once
         FROM reading r JOIN measure m ON m.id = r.measure_id
         JOIN subject s ON s.id = r.subject_id WHERE s.code = $1 ORDER BY r.id`,
      [code],
    );
    const none = { value: null, choice: null, limit_sign: null, limit_value: null, not_done: null };
    expect(rows).toEqual([
      { ...none, short_name: 'sway', replicate: 1, value: 61.5, once: false },
      { ...none, short_name: 'sway', replicate: 2, limit_sign: '<', limit_value: 20, once: false },
      { ...none, short_name: 'falls', replicate: 1, not_done: 'subject refused', once: false },
      { ...none, short_name: 'sex', replicate: 1, choice: 'f', once: true },
    ]);
    expect(visit.uid).toMatch(/^[0-9a-f-]{36}$/);
  });

  it.each([
    ['reading_impossible', { measure: 'sway', value: 901 }],
    ['reading_implausible', { measure: 'sway', value: 201 }],
    ['reading_not_positive', { measure: 'sway', value: 0 }],
    ['reading_not_finite', { measure: 'sway', value: Number.NaN }],
    ['reading_not_count', { measure: 'falls', value: 1.5 }],
    ['reading_choice_unknown', { measure: 'sex', choice: 'x' }],
    ['reading_choice_unknown', { measure: 'sway', choice: 'f' }],
    ['reading_one_content', { measure: 'sway' }],
    ['reading_one_content', { measure: 'sway', value: 60, notDone: 'unknown' }],
    ['reading_not_done_reason', { measure: 'sway', notDone: 'forgot' }],
    ['reading_measure_unknown', { measure: 'height', value: 170 }],
  ])('is refused whole with %s for %j', async (problem, reading) => {
    const before = await countRows();
    await expect(
      log({ readings: [{ measure: 'falls', replicate: 2, value: 0 }, reading] }),
    ).rejects.toMatchObject(refused(problem));
    expect(await countRows()).toEqual(before);
  });

  it('keeps an implausible value with its explanation', async () => {
    await log({ readings: [{ measure: 'sway', value: 240, explanation: 'read again, correct' }] });
    const [row] = await database.query(
      `SELECT r.value, r.explanation FROM reading r JOIN subject s ON s.id = r.subject_id WHERE s.code = $1`,
      [code],
    );
    expect(row).toEqual({ value: 240, explanation: 'read again, correct' });
  });

  it('refuses a visit twice, unscheduled without reason, unknown, in the future, before consent', async () => {
    await log();
    const before = await countRows();
    await expect(log({ date: '2026-10-02' })).rejects.toMatchObject(
      refused('visit_logged_already', { held: '2026-10-01' }),
    );
    await expect(log({ planned: null })).rejects.toMatchObject(refused('visit_reason_missing'));
    await expect(log({ planned: 'Week 99' })).rejects.toMatchObject(refused('visit_plan_unknown'));
    await expect(log({ planned: 'Week 8', date: '2026-12-02' })).rejects.toMatchObject(
      refused('subject_date_future', { today: '2026-12-01' }),
    );
    await expect(log({ planned: 'Week 8', date: '2026-09-27' })).rejects.toMatchObject(
      refused('subject_before_consent'),
    );
    await expect(
      log({
        readings: [
          { measure: 'sway', value: 50 },
          { measure: 'sway', value: 51 },
        ],
        planned: 'Week 4',
      }),
    ).rejects.toMatchObject(refused('reading_twice'));
    expect(await countRows()).toEqual(before);
    await log({ planned: null, unscheduledReason: 'fell at home', date: '2026-10-15' });
  });

  it('speaks of a subject of another site as of an unknown one', async () => {
    const elsewhere = `S${serial}`;
    await study.act('owner', (act) =>
      enrolSubject(act, enrolment({ siteCode: 'SOU', code: elsewhere })),
    );
    const told = async (subjectCode: string) =>
      log({ subjectCode }).catch((error: { code: string; params: object }) => ({
        code: error.code,
        keys: Object.keys(error.params),
      }));
    expect(await told(elsewhere)).toEqual(await told('nobody'));
  });

  it('stops once the study is locked', async () => {
    await database.query(`UPDATE study SET state = 'locked' WHERE id = $1`, [study.id]);
    const before = await countRows();
    await expect(log()).rejects.toMatchObject(refused('study_not_open', { state: 'locked' }));
    // Nothing was written but that it was tried.
    expect(await countRows()).toEqual({ ...before, entries: String(Number(before?.entries) + 1) });
    const [entry] = await database.query(
      'SELECT action, actor_name FROM audit.entry WHERE chain = $1 ORDER BY seq DESC LIMIT 1',
      [study.uid],
    );
    expect(entry).toEqual({
      action: 'act refused: study not open',
      actor_name: 'Kit coordinator',
    });
    await database.query(`UPDATE study SET state = 'open' WHERE id = $1`, [study.id]);
  });
});

describe('a missed visit', () => {
  beforeEach(() => enrol());
  const miss = (planned: string, reason: 'away' | 'other', reasonText?: string) =>
    study.act('coordinator', (act) =>
      missVisit(act, { subjectCode: code, planned, reason, reasonText }),
    );

  it('needs a reason of the list, words for “other”, and an open window', async () => {
    await expect(miss('Week 4', 'other')).rejects.toMatchObject(refused('visit_missed_reason'));
    study.clock.now = new Date('2026-10-23T12:00:00Z');
    await expect(miss('Week 4', 'away')).rejects.toMatchObject(
      refused('visit_not_due', { opens: '2026-10-24' }),
    );
    study.clock.now = new Date('2026-10-24T12:00:00Z');
    await miss('Week 4', 'other', 'the hall was flooded');
    await expect(log({ planned: 'Week 4', date: '2026-10-24' })).rejects.toMatchObject(
      refused('visit_logged_already', { held: 'missed: other' }),
    );
  });
});

describe('correcting a reading', () => {
  let uid: string;
  beforeEach(async () => {
    await enrol();
    await log({ readings: [{ measure: 'sway', value: 61.5 }] });
    const [row] = await database.query<{ uid: string }>(
      'SELECT r.uid FROM reading r JOIN subject s ON s.id = r.subject_id WHERE s.code = $1',
      [code],
    );
    uid = row?.uid ?? '';
  });
  const correct = (over = {}, role: 'coordinator' | 'owner' = 'coordinator', sites?: string[]) =>
    study.act(
      role,
      (act) =>
        correctReading(act, {
          readingUid: uid,
          version: 1,
          value: 65.1,
          reason: 'transcription error',
          ...over,
        }),
      sites,
    );

  it('keeps the old content as a revision that nobody changes', async () => {
    const reading = await correct();
    expect(reading).toMatchObject({ value: 65.1, version: 2 });
    const revisions = await database.query(
      `SELECT v.old_value, v.new_value, v.reason FROM reading_revision v
         JOIN reading r ON r.id = v.reading_id WHERE r.uid = $1`,
      [uid],
    );
    expect(revisions).toEqual([
      { old_value: 61.5, new_value: 65.1, reason: 'transcription error' },
    ]);
    await expect(database.query('DELETE FROM reading_revision')).rejects.toMatchObject({
      code: '55000',
    });
  });

  it('turns a value into one that was not done', async () => {
    const reading = await correct({ value: null, notDone: 'instrument failure' });
    expect(reading).toMatchObject({ value: null, notDone: 'instrument failure' });
  });

  it('is refused stale, unchanged, without reason, implausible, or for another site', async () => {
    const before = await countRows();
    await expect(correct({ version: 3 })).rejects.toMatchObject(
      refused('stale_version', { given: 3, held: 1 }),
    );
    await expect(correct({ value: 61.5 })).rejects.toMatchObject(refused('reading_unchanged'));
    await expect(correct({ reason: 'other' })).rejects.toMatchObject(refused('correction_reason'));
    await expect(correct({ value: 500 })).rejects.toMatchObject(refused('reading_implausible'));
    await expect(correct({}, 'coordinator', [study.siteIds.SOU])).rejects.toMatchObject(
      refused('not_found'),
    );
    expect(await countRows()).toEqual(before);
  });

  it('lets one of two who correct at once through', async () => {
    const results = await Promise.allSettled([correct({ value: 70 }), correct({ value: 71 })]);
    expect(results.map((result) => result.status).sort()).toEqual(['fulfilled', 'rejected']);
  });
});

it('leaves a whole trail behind', async () => {
  const { masked } = await database.databases();
  expect((await verifyChains(masked)).broken).toEqual([]);
});
