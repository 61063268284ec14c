import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { correctReading } from '../../api/features/readings/service.ts';
import { changeSubjectState } from '../../api/features/subjects/service.ts';
import { logVisit } from '../../api/features/visits/service.ts';
import type { TestDatabase } from '../support/test-database.ts';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { ARMS, type StudyForTests } from './analysis-study.ts';

let database: TestDatabase;
let study: StudyForTests;
let app: AnalystApp;

beforeAll(async () => {
  app = await openAnalysis({ masked: true });
  ({ database, study } = app);
});
afterAll(async () => {
  await app.close();
});

const request = {
  name: 'First look',
  visitCutoff: '2026-11-30',
  measures: ['reaction', 'age'],
  exclusions: [],
  includeWithdrawnReason: null,
};

async function storedRows(): Promise<number[]> {
  const [row] = await database.query<{ cuts: number; chunks: number; entries: number }>(
    `SELECT (SELECT count(*) FROM cut)::int AS cuts, (SELECT count(*) FROM cut_chunk)::int AS chunks,
            (SELECT count(*) FROM audit.entry WHERE action LIKE 'cut %')::int AS entries`,
  );
  return [row?.cuts ?? -1, row?.chunks ?? -1, row?.entries ?? -1];
}

describe('before freezing', () => {
  it('offers the measures of the set-up and today', async () => {
    const answer = await app.get('analyst', '/cut-choices');
    expect(answer.status).toBe(200);
    expect(answer.body.today).toBe('2026-12-01');
    expect(answer.body.lateDays).toBe(14);
    expect(answer.body.measures.map((one: { shortName: string }) => one.shortName)).toEqual([
      'reaction',
      'lapses',
      'rested',
      'place',
      'age',
    ]);
  });

  it('counts what a cut would hold', async () => {
    const answer = await app.get(
      'analyst',
      '/cut-preview?visitCutoff=2026-11-30&measures=reaction,age',
    );
    expect(answer.status).toBe(200);
    expect(answer.body).toEqual({
      rows: 180,
      subjects: 18,
      readings: 198,
      late: 180,
      pending: 0,
      withdrawnReadings: 0,
      withdrawnSubjects: 0,
      lateDays: 14,
    });
  });

  it.each([
    ['a cutoff in the future', { visitCutoff: '2026-12-02' }, 'cut_in_future', 'visitCutoff'],
    [
      'a day that is not in the calendar',
      { visitCutoff: '2026-02-30' },
      'cut_day_invalid',
      'visitCutoff',
    ],
    [
      'an unknown measure',
      { measures: ['reaction', 'weight'] },
      'cut_measure_unknown',
      'measures.1',
    ],
    ['no measure read at visits', { measures: ['age'] }, 'cut_needs_visit_measure', 'measures'],
    [
      'an exclusion of an unknown subject',
      {
        exclusions: [{ subjectCode: '999', measure: null, visit: null, reason: 'not one of ours' }],
      },
      'cut_exclusion_unknown',
      'exclusions.0.subjectCode',
    ],
    [
      'an exclusion of an unknown visit',
      {
        exclusions: [
          { subjectCode: '308', measure: null, visit: 'Day 77', reason: 'not one of ours' },
        ],
      },
      'cut_exclusion_unknown',
      'exclusions.0.visit',
    ],
    [
      'a day before anything was due',
      { visitCutoff: '2026-10-01' },
      'cut_nothing_to_freeze',
      undefined,
    ],
  ])('refuses %s and writes nothing', async (_what, change, code, path) => {
    const before = await storedRows();
    const answer = await app.post('analyst', '/cuts', { ...request, ...change });
    expect(answer.status).toBe(422);
    expect(answer.body.code).toBe(code);
    expect(answer.body.errors[0]?.path).toBe(path);
    expect(answer.body.detail).not.toContain('{');
    expect(await storedRows()).toEqual(before);
  });
});

describe('a frozen cut', () => {
  let id: string;

  it('is written once under one key', async () => {
    const first = await app.post('analyst', '/cuts', request, 'freeze-0001');
    const again = await app.post('analyst', '/cuts', request, 'freeze-0001');
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.body.id).toBe(first.body.id);
    expect(await storedRows()).toEqual([1, 1, 1]);
    expect(first.body).toMatchObject({
      number: 1,
      rows: 180,
      subjects: 18,
      late: 180,
      pending: 0,
      enteredUntil: '2026-12-01T12:00:00.000Z',
      frozenBy: 'Robin analyst',
      difference: null,
      groups: [],
    });
    id = first.body.id;
  });

  it('downloads as the bytes that hash to the number shown, and leaves a trace', async () => {
    const { sha256 } = (await app.get('owner', `/cuts/${id}`)).body;
    const file = await app.get('analyst', `/cuts/${id}/file`).then((answer) => answer);
    expect(file.headers['content-type']).toContain('text/csv');
    expect(createHash('sha256').update(file.text).digest('hex')).toBe(sha256);
    const lines = file.text.split('\n');
    expect(lines[0]).toBe(
      'subject,site,visit,planned,day,planned_day,replicate,age,age_note,reaction,reaction_note',
    );
    expect(lines[1]).toBe('308,quay,Day 0,1,0,0,1,30,,249.56,');
    const entries = await database.query<{ body: string }>(
      `SELECT body FROM audit.entry WHERE action = 'cut downloaded'`,
    );
    expect(entries).toHaveLength(1);
    expect(entries[0]?.body).toContain('"role":"analyst"');
  });

  it('is not moved by later readings and corrections; the next cut tells the difference', async () => {
    const before = (await app.get('analyst', `/cuts/${id}/file`)).text;
    study.clock.now = new Date('2026-12-01T12:02:00.000Z');
    const [reading] = await database.query<{ uid: string; version: number }>(
      `SELECT r.uid, r.version FROM reading r JOIN measure m ON m.id = r.measure_id
        WHERE m.short_name = 'reaction' ORDER BY r.id LIMIT 1`,
    );
    await study.act('coordinator', (act) =>
      correctReading(act, {
        readingUid: reading?.uid ?? '',
        version: reading?.version ?? 0,
        value: 250,
        reason: 'transcription error',
      }),
    );
    await study.act('coordinator', (act) =>
      logVisit(act, {
        subjectCode: '309',
        planned: null,
        unscheduledReason: 'came by',
        date: '2026-11-20',
        contactMode: 'phone',
        readings: [{ measure: 'reaction', limit: { sign: '<', value: 200.5 } }],
      }),
    );
    expect((await app.get('analyst', `/cuts/${id}/file`)).text).toBe(before);
    const second = await app.post('analyst', '/cuts', { ...request, name: 'Second look' });
    expect(second.body.difference).toMatchObject({
      against: { id, number: 1, name: 'First look' },
      added: 1,
      changed: 1,
      gone: 0,
    });
    const file = (await app.get('analyst', `/cuts/${second.body.id}/file`)).text;
    expect(file).toContain('309,quay,unscheduled,0,19,,1,31,,,<200.5\n');
    const back = await app.get('owner', `/cuts/${id}/difference?against=${second.body.id}`);
    expect(back.body).toMatchObject({ added: 0, changed: 1, gone: 1 });
  });

  it('can be changed by nobody at the database', async () => {
    const { masked } = await database.databases();
    for (const sql of [
      "UPDATE cut SET name = 'x'",
      'DELETE FROM cut_chunk',
      'TRUNCATE cut CASCADE',
    ]) {
      await expect(masked.query(sql)).rejects.toThrow();
      await expect(database.query(sql)).rejects.toThrow();
    }
  });

  it('leaves out subjects who withdrew consent, unless a reason stands', async () => {
    await study.act('coordinator', (act) =>
      changeSubjectState(act, {
        subjectCode: '310',
        state: 'consent withdrawn',
        date: '2026-11-25',
        reason: 'withdrew by letter',
      }),
    );
    const preview = await app.get(
      'analyst',
      '/cut-preview?visitCutoff=2026-11-30&measures=reaction',
    );
    expect(preview.body).toMatchObject({
      withdrawnSubjects: 1,
      withdrawnReadings: 10,
      subjects: 17,
    });
    const without = await app.post('analyst', '/cuts', { ...request, name: 'Third' });
    expect(without.body.withdrawnLeftOut).toEqual({ subjects: 1, readings: 11 });
    expect((await app.get('analyst', `/cuts/${without.body.id}/file`)).text).not.toContain(
      '\n310,',
    );
    const included = await app.post('analyst', '/cuts', {
      ...request,
      name: 'Fourth',
      includeWithdrawnReason: 'The consent form allows readings kept until then.',
    });
    expect(included.body.withdrawnLeftOut).toEqual({ subjects: 0, readings: 0 });
    expect(included.body.subjects).toBe(18);
  });

  it('shows excluded readings by their reason and drops an excluded subject', async () => {
    const answer = await app.post('analyst', '/cuts', {
      ...request,
      name: 'Fifth',
      exclusions: [
        { subjectCode: '308', measure: 'reaction', visit: 'Day 3', reason: 'woken twice,\n noted' },
        { subjectCode: '309', measure: null, visit: null, reason: 'took part elsewhere' },
      ],
    });
    const { text } = await app.get('analyst', `/cuts/${answer.body.id}/file`);
    expect(text).toContain('308,quay,Day 3,1,3,3,1,30,,,"excluded: woken twice, noted"\n');
    expect(text).not.toContain('\n309,');
  });

  it('is listed by page, sorted and searched', async () => {
    const page = await app.get('owner', '/cuts?sort=name&direction=asc&pageSize=2');
    expect(page.body.total).toBe(5);
    expect(page.body.rows.map((row: { name: string }) => row.name)).toEqual([
      'Fifth',
      'First look',
    ]);
    expect((await app.get('owner', '/cuts?text=LOOK')).body.total).toBe(2);
    expect((await app.get('owner', '/cuts?pageSize=500')).status).toBe(422);
  });

  it('holds no arm of a masked study anywhere', async () => {
    const answers = [
      await app.get('analyst', '/cuts'),
      await app.get('analyst', `/cuts/${id}`),
      await app.get('analyst', `/cuts/${id}/file`),
      await app.get('analyst', '/cut-choices'),
    ];
    for (const answer of answers) {
      for (const arm of ARMS) {
        expect(answer.text).not.toContain(arm);
      }
    }
    const stored = await database.query<{ text: string }>(
      `SELECT convert_from(bytes, 'UTF8') AS text FROM cut_chunk`,
    );
    expect(stored.every((row) => !ARMS.some((arm) => row.text.includes(arm)))).toBe(true);
  });
});

describe('who may', () => {
  it('lets analyst and owner read, the analyst alone freeze, and nobody else in', async () => {
    const before = await storedRows();
    for (const person of ['coordinator', 'monitor', 'statistician', 'board', 'safety'] as const) {
      expect((await app.get(person, '/cuts')).status).toBe(403);
      expect((await app.post(person, '/cuts', request)).status).toBe(403);
    }
    expect((await app.post('owner', '/cuts', request)).status).toBe(403);
    expect(
      (await app.get('owner', '/cut-preview?visitCutoff=2026-11-30&measures=reaction')).status,
    ).toBe(403);
    expect((await app.get(null, '/cuts')).status).toBe(401);
    expect(await storedRows()).toEqual(before);
  });
});
