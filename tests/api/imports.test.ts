/** Imports through their service on a real PostgreSQL: what is written, what is refused, what a repeat does. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ImportView } from '../../api/contracts/imports.ts';
import { listImplausible, listRefusals, refusalLines } from '../../api/features/imports/listing.ts';
import { importOf } from '../../api/features/imports/rows.ts';
import { correctReading } from '../../api/features/readings/service.ts';
import { changeSubjectState } from '../../api/features/subjects/service.ts';
import { logVisit, missVisit } from '../../api/features/visits/service.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { heldBy, type ImportStudy, MAPPING, makeImportStudy } from './import-study.ts';

let database: TestDatabase;
let study: ImportStudy;

beforeAll(async () => {
  database = await createTestDatabase();
  study = await makeImportStudy(database);
});
afterAll(async () => {
  await study.close();
  await database.drop();
});

const scope = () => ({
  studyId: study.context.membership.studyId,
  accountId: study.context.actor.accountId,
});
const idOf = async (view: ImportView) =>
  (await importOf(study.context.db.manager, scope(), view.id)).id;
const refusalsOf = async (view: ImportView) =>
  (await listRefusals(study.context.db, await idOf(view), { page: 1, pageSize: 200 })).rows;
const reasons = async (view: ImportView) =>
  (await refusalsOf(view)).map((row) => [row.line, row.reason.code]);

const held = () => heldBy(database);

const readingsOf = (code: string) =>
  database.query<{ visit: string; date: string; value: number; reason: string | null }>(
    `SELECT coalesce(p.name, 'unscheduled') AS visit, v.date::text, r.value, v.unscheduled_reason AS reason
       FROM reading r JOIN subject s ON s.id = r.subject_id JOIN visit v ON v.id = r.visit_id
       LEFT JOIN planned_visit p ON p.id = v.planned_visit_id
       JOIN measure m ON m.id = r.measure_id AND m.short_name = 'weight'
      WHERE s.code = $1 ORDER BY v.date, r.replicate`,
    [code],
  );

describe('placing days', () => {
  it('gives a day to the closest window, on a tie the later, and to none an unscheduled visit', async () => {
    // Worked by hand from the windows of the study: 10..18 around 14, 16..23 around 20.
    const applied = await study.import(
      'subject,day,weight\nQ01,0,70\nQ01,16,71\nQ01,17,72\nQ01,40,73.5\n',
    );
    expect(applied.state).toBe('applied');
    expect(applied.counts).toMatchObject({ fresh: 4, newVisits: 4, unscheduled: 1, refused: 0 });
    expect(await readingsOf('Q01')).toEqual([
      { visit: 'Start', date: '2026-09-01', value: 70, reason: null },
      { visit: 'Week 2', date: '2026-09-17', value: 71, reason: null },
      { visit: 'Week 3', date: '2026-09-18', value: 72, reason: null },
      { visit: 'unscheduled', date: '2026-10-11', value: 73.5, reason: 'from import' },
    ]);
  });

  it('refuses a second day in one window and shows both dates, whatever the order of rows', async () => {
    for (const order of ['Q02,13,80\nQ02,15,81\n', 'Q02,15,81\nQ02,13,80\n']) {
      const view = await study.check(await study.upload(`subject,day,weight\n${order}`));
      const [refused] = await refusalsOf(view);
      // 13 and 15 lie as far from 14: on a tie the later is the visit.
      expect(refused?.reason).toEqual({
        code: 'row_visit_date_differs',
        params: { visit: 'Week 2', held: '2026-09-16', given: '2026-09-14' },
      });
      expect(view.counts).toMatchObject({ fresh: 1, refused: 1 });
    }
  });
});

describe('a repeat', () => {
  const file = 'subject,day,weight\nQ02,0,80\nQ02,20,82.5\n';

  it('changes nothing but one import record and one audit entry, however the file is written', async () => {
    await study.import(file);
    const forms: [string, string][] = [
      ['the same bytes', file],
      ['rows in another order', 'subject,day,weight\nQ02,20,82.5\nQ02,0,80\n'],
      ['other line ends and a mark at the start', `\ufeff${file.replaceAll('\n', '\r\n')}`],
      ['another spelling of the numbers', 'subject,day,weight\nQ02,0,80.0\nQ02,20,8.25e1\n'],
      ['semicolons', file.replaceAll(',', ';')],
    ];
    for (const [name, text] of forms) {
      const before = await held();
      const view = await study.import(text);
      expect(view.state, name).toBe('nothing new');
      const after = await held();
      expect(after, name).toEqual({
        ...before,
        imports: (before.imports ?? 0) + 1,
        entries: (before.entries ?? 0) + 1,
      });
    }
    const [entry] = await database.query<{ action: string }>(
      'SELECT action FROM audit.entry ORDER BY at DESC, seq DESC LIMIT 1',
    );
    expect(entry?.action).toBe('nothing new');
  });

  it('never undoes a correction', async () => {
    const [reading] = await database.query<{ uid: string; version: number }>(
      `SELECT r.uid, r.version FROM reading r JOIN subject s ON s.id = r.subject_id WHERE s.code = 'Q02' AND r.value = 82.5`,
    );
    await study.act((act) =>
      correctReading(act, {
        readingUid: reading?.uid ?? '',
        version: reading?.version ?? 0,
        value: 85.2,
        reason: 'transcription error',
      }),
    );
    expect((await study.import(file)).state).toBe('nothing new');
    expect((await readingsOf('Q02')).map((row) => row.value)).toEqual([80, 85.2]);
  });

  it('is known too when its visit was moved to another date since', async () => {
    await database.query(
      `UPDATE visit SET date = '2026-09-22' WHERE date = '2026-09-21' AND subject_id = (SELECT id FROM subject WHERE code = 'Q02')`,
    );
    expect((await study.import(file)).state).toBe('nothing new');
  });

  it('refuses another value for a reading that is held, and shows both', async () => {
    const view = await study.check(await study.upload('subject,day,weight\nQ02,0,81\n'));
    expect((await refusalsOf(view))[0]?.reason).toEqual({
      code: 'row_value_differs',
      params: { held: '80', given: '81' },
    });
  });
});

describe('refused rows', () => {
  it('name line and reason, and the good rows stand', async () => {
    const view = await study.check(
      await study.upload(
        [
          'subject,day,weight',
          'Q09,0,70',
          'P01,0,70',
          'Q01,1.5,70',
          'Q01,60,"70,5"',
          'Q01,60,70 kg',
          'Q01,60,=1+1',
          'Q01,60',
          'Q01,60,',
          'Q01,60,-3',
          '=Q01,60,70',
          'Q01,200,70',
          'Q01,-4,70',
          'Q01,60,301',
          'Q01,61,70',
          'Q01,61,71',
          '',
          'Q01,62,70',
          'NA,0,70',
        ].join('\n'),
      ),
    );
    expect(await reasons(view)).toEqual([
      [2, 'row_subject_unknown'],
      [3, 'row_subject_unknown'],
      [4, 'row_day_form'],
      [5, 'row_value_comma'],
      [6, 'row_value_text'],
      [7, 'row_formula'],
      [8, 'row_ragged'],
      [9, 'row_value_missing'],
      [10, 'row_value_not_positive'],
      [11, 'row_formula'],
      [12, 'row_date_future'],
      [13, 'row_before_consent'],
      [14, 'row_impossible'],
      [16, 'row_duplicate'],
      // Line 17 is blank.
      [19, 'row_subject_missing'],
    ]);
    expect(view.counts).toMatchObject({ rows: 17, fresh: 2, refused: 15 });
  });

  it('speak of a subject of another site as of an unknown one', async () => {
    const view = await study.check(await study.upload('subject,day,weight\nQ09,0,70\nP01,0,70\n'));
    const [unknown, elsewhere] = await refusalsOf(view);
    expect(elsewhere?.reason.code).toBe(unknown?.reason.code);
    expect(Object.keys(elsewhere?.reason.params ?? {})).toEqual(
      Object.keys(unknown?.reason.params ?? {}),
    );
  });

  it('come as a file that a spreadsheet can open safely', async () => {
    const view = await study.check(await study.upload('subject,day,weight\n=Q01,0,70\nQ01,0,@x\n'));
    let text = '';
    for await (const piece of refusalLines(study.context.db, await idOf(view))) text += piece;
    expect(text.split('\r\n').slice(0, 3)).toEqual([
      'line,subject,value,reason',
      '2,\'=Q01,70,"Column `subject` holds `=Q01`, which a spreadsheet would calculate. Write the value itself."',
      '3,Q01,\'@x,"Column `weight` holds `@x`, which a spreadsheet would calculate. Write the value itself."',
    ]);
  });

  it('refuse what lies after the end of follow-up, and a visit recorded as missed', async () => {
    await study.import('subject,day,weight,site\nQ20,0,70,quay\nQ21,0,70,quay\n', {
      ...MAPPING,
      site: 'site',
      newSubjects: {
        site: { from: 'column', column: 'site' },
        consentVersion: { from: 'fixed', value: '2' },
        consentDate: { from: 'fixed', value: '2026-08-31' },
        baselineDate: { from: 'fixed', value: '2026-09-01' },
        order: 'year-month-day',
      },
    });
    await study.act(async (act) => {
      await missVisit(act, { subjectCode: 'Q20', planned: 'Week 2', reason: 'away' });
      await changeSubjectState(act, {
        subjectCode: 'Q21',
        state: 'consent withdrawn',
        date: '2026-09-10',
        reason: 'in writing',
      });
    });
    const view = await study.check(
      await study.upload('subject,day,weight\nQ20,14,70\nQ21,14,70\n'),
    );
    expect(await reasons(view)).toEqual([
      [2, 'row_visit_missed'],
      [3, 'row_after_end'],
    ]);
  });
});

describe('dates, visits and new subjects', () => {
  const dated = {
    ...MAPPING,
    when: { kind: 'date', column: 'when', order: 'day-month-year' } as const,
  };

  it('takes the order of day and month from the person and never guesses', async () => {
    const view = await study.check(
      await study.upload(
        'subject,when,weight\nQ01,03/10/2026,70\nQ01,30/02/2026,70\nQ01,2026-10-03,70\n',
      ),
      dated,
    );
    expect(await reasons(view)).toEqual([
      [3, 'row_date_impossible'],
      [4, 'row_date_form'],
    ]);
    const applied = await study.apply(view);
    expect(applied.state).toBe('applied');
    expect((await readingsOf('Q01')).map((row) => row.date)).toContain('2026-10-03');
  });

  it('adds a second measure to the visit of that day by the name of the visit', async () => {
    const view = await study.import(
      'subject,visit,lapses\nQ01,Week 2,3\nQ01,Week 9,1\nQ02,Week 2,1\n',
      { ...MAPPING, value: 'lapses', when: { kind: 'visit', column: 'visit' } },
      'lapses',
    );
    expect(view.counts).toMatchObject({ fresh: 1, newVisits: 0 });
    expect(await reasons(view)).toEqual([
      [3, 'row_visit_name'],
      [4, 'row_visit_not_logged'],
    ]);
  });

  it('joins the logged visit of that day, also where it was logged outside its window', async () => {
    await study.act((act) =>
      logVisit(act, {
        subjectCode: 'Q20',
        planned: 'Week 3',
        date: '2026-10-30',
        contactMode: 'in person',
        readings: [],
      }),
    );
    const view = await study.import('subject,when,weight\nQ20,30/10/2026,77\n', dated);
    expect(view.counts).toMatchObject({ fresh: 1, newVisits: 0 });
    expect((await readingsOf('Q20')).at(-1)).toMatchObject({ visit: 'Week 3', value: 77 });
  });

  it('enrols new subjects with what the page asked, and refuses rows that disagree', async () => {
    const facts = (over: object) => ({
      ...MAPPING,
      newSubjects: {
        site: { from: 'fixed' as const, value: 'quay' },
        consentVersion: { from: 'fixed' as const, value: '2' },
        consentDate: { from: 'column' as const, column: 'consent' },
        baselineDate: { from: 'fixed' as const, value: '2026-09-05' },
        order: 'year-month-day' as const,
        ...over,
      },
    });
    const text =
      'subject,day,weight,consent\n007,0,70,2026-09-01\n007,14,71,2026-09-01\nQ31,0,70,2026-09-01\nQ31,14,70,2026-09-02\nQ32,0,70,2026-09-09\nP01,0,70,2026-09-01\n';
    const elsewhere = await study.check(
      await study.upload(text),
      facts({ site: { from: 'fixed', value: 'pier' } }),
    );
    expect((await refusalsOf(elsewhere))[0]?.reason.code).toBe('row_site_unknown');
    const view = await study.import(text, facts({}));
    expect(await reasons(view)).toEqual([
      [4, 'row_new_subject_differs'],
      [5, 'row_new_subject_differs'],
      [6, 'row_baseline_before_consent'],
      [7, 'row_subject_unknown'],
    ]);
    const rows = await database.query(
      `SELECT code, state, consent_version, consent_date::text, baseline_date::text FROM subject WHERE code IN ('007', '7', 'Q31', 'Q32')`,
    );
    expect(rows).toEqual([
      {
        code: '007',
        state: 'enrolled',
        consent_version: '2',
        consent_date: '2026-09-01',
        baseline_date: '2026-09-05',
      },
    ]);
  });

  it('asks for consent and baseline only where the subject is new', async () => {
    const mapping = {
      ...MAPPING,
      newSubjects: {
        site: { from: 'fixed' as const, value: 'quay' },
        consentVersion: { from: 'fixed' as const, value: '2' },
        consentDate: { from: 'column' as const, column: 'consent' },
        baselineDate: { from: 'fixed' as const, value: '2026-09-05' },
        order: 'year-month-day' as const,
      },
    };
    const view = await study.check(
      await study.upload('subject,day,weight,consent\nQ01,60,70,\nQ35,0,70,\n'),
      mapping,
    );
    expect(view.counts).toMatchObject({ fresh: 1, refused: 1 });
    expect((await refusalsOf(view)).map((row) => [row.line, row.reason])).toEqual([
      [
        3,
        {
          code: 'row_date_form',
          params: { column: 'consent', value: '', order: 'year-month-day' },
        },
      ],
    ]);
  });

  it('keeps a measure that is read once with the subject', async () => {
    const view = await study.import(
      'subject,age\nQ01,64\nQ02,71\n',
      { ...MAPPING, value: 'age', when: null },
      'age',
    );
    expect(view.counts).toMatchObject({ fresh: 2, newVisits: 0 });
    expect(
      (await study.import('subject,age\nQ02,71\n', { ...MAPPING, value: 'age', when: null }, 'age'))
        .state,
    ).toBe('nothing new');
  });

  it('keeps replicates apart and limits as limits', async () => {
    const view = await study.import(
      'subject,day,weight,rep\nQ20,60,70,1\nQ20,60,71,2\nQ20,61,<40,1\n',
      {
        ...MAPPING,
        replicate: 'rep',
      },
    );
    expect(view.counts).toMatchObject({ fresh: 3, newVisits: 2 });
    const rows = await database.query(
      `SELECT r.limit_sign, r.limit_value FROM reading r WHERE r.limit_sign IS NOT NULL`,
    );
    expect(rows).toEqual([{ limit_sign: '<', limit_value: 40 }]);
  });
});

describe('implausible values', () => {
  const file = 'subject,day,weight\nQ01,70,130\nQ01,71,80\n';

  it('are listed, and left out unless one explanation keeps them', async () => {
    const view = await study.check(await study.upload(file));
    expect(view.counts).toMatchObject({ fresh: 2, implausible: 1 });
    const row = await importOf(study.context.db.manager, scope(), view.id);
    expect((await listImplausible(study.context.db, row, { page: 1, pageSize: 50 })).rows).toEqual([
      {
        line: 2,
        subject: 'Q01',
        visit: '2026-11-10',
        value: 130,
        plausibleLow: 40,
        plausibleHigh: 120,
      },
    ]);
    const applied = await study.apply(view);
    expect(applied.state).toBe('applied');
    expect((await readingsOf('Q01')).map((one) => one.value)).not.toContain(130);

    const again = await study.apply(await study.check(await study.upload(file)), {
      explanation: 'scale read again, correct',
    });
    expect(again.state).toBe('applied');
    const [kept] = await database.query<{ explanation: string }>(
      'SELECT explanation FROM reading WHERE value = 130',
    );
    expect(kept?.explanation).toBe('scale read again, correct');
  });
});
