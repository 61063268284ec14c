import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { changeSubjectState } from '../../api/features/subjects/service.ts';
import { logVisit } from '../../api/features/visits/service.ts';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { enrol, type StudyForTests } from './analysis-study.ts';

let app: AnalystApp;

/** Three subjects: what is logged lets each test choose its cut by date, measure and exclusion. */
async function load(study: StudyForTests): Promise<void> {
  await study.act('coordinator', async (act) => {
    for (const code of ['a', 'b', 'c']) {
      await enrol(act, code);
      await logVisit(act, {
        subjectCode: code,
        planned: 'Day 0',
        date: '2026-11-01',
        contactMode: 'in person',
        readings: [
          { measure: 'reaction', value: code === 'a' ? 200 : code === 'b' ? 210 : 260 },
          { measure: 'lapses', notDone: 'subject refused' },
        ],
      });
    }
    const later = { date: '2026-11-04', planned: 'Day 3', contactMode: 'in person' } as const;
    await logVisit(act, {
      ...later,
      subjectCode: 'a',
      readings: [
        { measure: 'reaction', limit: { sign: '>', value: 500 } },
        { measure: 'lapses', value: 3 },
      ],
    });
    await logVisit(act, {
      ...later,
      subjectCode: 'b',
      readings: [
        { measure: 'reaction', value: 230 },
        { measure: 'lapses', notDone: 'unknown' },
      ],
    });
    await changeSubjectState(act, {
      subjectCode: 'b',
      state: 'lost to follow-up',
      date: '2026-11-05',
      reason: 'moved away',
    });
  });
}

beforeAll(async () => {
  app = await openAnalysis({ masked: true, load });
});
afterAll(() => app.close());

async function freeze(change: object): Promise<string> {
  const answer = await app.post('analyst', '/cuts', {
    name: 'Edge',
    visitCutoff: '2026-11-04',
    measures: ['reaction', 'lapses'],
    exclusions: [],
    includeWithdrawnReason: null,
    ...change,
  });
  expect(answer.status, answer.text).toBe(201);
  return answer.body.id;
}

const specification = {
  measure: 'reaction',
  axis: 'since_baseline',
  unit: 'days',
  group: false,
} as const;
const check = (cut: string, change: object = {}) =>
  app.post('analyst', `/cuts/${cut}/check`, { specification: { ...specification, ...change } });
const without = (subjectCode: string) => ({
  subjectCode,
  measure: null,
  visit: null,
  reason: 'left out for a test',
});

describe('what no line can be fitted to is said in words', () => {
  it('one time only', async () => {
    const answer = await check(await freeze({ visitCutoff: '2026-11-01' }));
    expect([answer.status, answer.body.code]).toEqual([422, 'engine_too_few_times']);
    expect(answer.body.detail).toContain('time 0');
  });

  it('one subject only', async () => {
    const answer = await check(await freeze({ exclusions: [without('a'), without('c')] }));
    expect([answer.status, answer.body.code]).toEqual([422, 'engine_too_few_subjects']);
    expect(answer.body.detail).toContain('subject b');
  });

  it('missing everywhere', async () => {
    const cut = await freeze({ visitCutoff: '2026-11-01' });
    const answer = await check(cut, { measure: 'lapses' });
    expect([answer.status, answer.body.code]).toEqual([422, 'engine_no_usable_rows']);
    const fit = await app.post('analyst', `/cuts/${cut}/fits`, {
      specification: { ...specification, measure: 'lapses' },
      fit: 'pooled',
      purpose: 'planned',
    });
    expect(fit.body.code).toBe('check_not_opened');
  });
});

describe('counts and readings', () => {
  it('counts censored readings apart from missing ones and from those not done', async () => {
    const cut = await freeze({});
    const answer = await check(cut);
    expect(answer.status, answer.text).toBe(200);
    // Days 1 and 2 were due for all three, day 3 for c as well: seven visits without an outcome.
    expect(answer.body.counts).toEqual({
      rows: 12,
      used: 4,
      missing: 7,
      censored: 1,
      notDone: 0,
      excluded: 0,
      noTime: 0,
      noGroup: 0,
    });
    expect(answer.body.cut.pending).toBe(7);
    expect(answer.body.cautions).toEqual([{ code: 'censored' }]);
    const pending = (await app.get('owner', `/cuts/${cut}`)).body.pendingRows;
    expect(pending).toHaveLength(7);
    expect(pending[0]).toEqual({
      subjectCode: 'a',
      visit: 'Day 1',
      windowClosed: '2026-11-02',
    });
  });

  it('marks who left early, and expects nothing of them afterwards', async () => {
    const cut = await freeze({ visitCutoff: '2026-11-10' });
    await check(cut);
    const answer = await app.post('analyst', `/cuts/${cut}/fits`, {
      specification,
      fit: 'pooled',
      purpose: 'exploratory',
    });
    expect(answer.status, answer.text).toBe(201);
    const ended = answer.body.picture.subjects.map(
      (one: { code: string; ended: object | null }) => [one.code, one.ended],
    );
    expect(ended).toEqual([
      ['a', null],
      ['b', { word: 'lost to follow-up', time: 4 }],
      ['c', null],
    ]);
    const { text } = await app.get('analyst', `/cuts/${cut}/file`);
    // Day 4 closed on the day b was lost; day 5 came after.
    expect(text).toContain('b,quay,Day 4,');
    expect(text).not.toContain('b,quay,Day 5,');
  });
});

describe('one reading each', () => {
  it('needs no acknowledgement: independence is taken from the design', async () => {
    const cut = await freeze({
      exclusions: [
        { subjectCode: 'b', measure: 'reaction', visit: 'Day 0', reason: 'kept once for a test' },
      ],
    });
    const opened = await check(cut);
    expect(opened.body.structure.subjects_with_repeats).toBe(0);
    expect(opened.body.independence).toMatchObject({ verdict: 'no_repeats', warn: false });
    expect(opened.body.counts.excluded).toBe(1);
    expect(opened.body.lock).toEqual({ locked: false, acknowledgement: null });
    const answer = await app.post('analyst', `/cuts/${cut}/fits`, {
      specification,
      fit: 'ordinary',
      purpose: 'planned',
    });
    expect(answer.status, answer.text).toBe(201);
    expect(answer.body.stamp).toBeNull();
    expect(answer.body.acknowledgement).toBeNull();
    expect(answer.body.headline.df).toBe(1);
  });
});
