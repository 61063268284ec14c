import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SubjectDetail, SubjectList } from '../../api/contracts/subjects.ts';
import { enterAllocation } from '../../api/features/allocation/service.ts';
import { addDays } from '../../api/features/cuts/days.ts';
import { correctReading } from '../../api/features/readings/service.ts';
import { changeSubjectState, enrolSubject } from '../../api/features/subjects/service.ts';
import { logVisit, missVisit } from '../../api/features/visits/service.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import {
  emailOf,
  makeSmallStudy,
  NOW,
  PASSWORD,
  SETUP,
  type SmallStudy,
} from './subjects-study.ts';

let app: TestApp;
let study: SmallStudy;
let other: SmallStudy;
const agents = new Map<string, TestAgent>();
const BASELINE = '2026-10-01';

beforeAll(async () => {
  app = await startTestApp({ now: NOW });
  study = await makeSmallStudy(app.database);
  other = await makeSmallStudy(app.database, { shortName: 'other' });
  await fill();
  for (const role of ['coordinator', 'monitor', 'owner', 'analyst']) {
    agents.set(role, await app.signedIn(emailOf(role), PASSWORD));
  }
});
afterAll(() => app.close());

/** Five subjects at the north hall, one at the south hall, and their allocation, sealed. */
async function fill(): Promise<void> {
  const enrolled = (siteCode: string, code: string) =>
    ({
      siteCode,
      code,
      state: 'enrolled',
      consentVersion: '1.2',
      consentDate: '2026-09-28',
      enrolmentDate: '2026-09-28',
      baselineDate: BASELINE,
    }) as const;
  await study.act('owner', async (act) => {
    for (const code of ['N001', 'N002', 'N003', 'N010', 'n-extra']) {
      await enrolSubject(act, enrolled('NOR', code));
    }
    await enrolSubject(act, enrolled('SOU', 'S001'));
    const visit = { contactMode: 'in person', subjectCode: 'N001' } as const;
    await logVisit(act, {
      ...visit,
      planned: 'Baseline',
      date: BASELINE,
      readings: [
        { measure: 'sway', value: 61.5 },
        { measure: 'falls', value: 0 },
        { measure: 'sex', choice: 'f' },
      ],
    });
    await logVisit(act, {
      ...visit,
      planned: 'Week 4',
      date: addDays(BASELINE, 40),
      readings: [
        { measure: 'sway', limit: { sign: '<', value: 20 } },
        { measure: 'falls', notDone: 'subject refused' },
      ],
    });
    await logVisit(act, {
      ...visit,
      planned: null,
      unscheduledReason: 'fell at home',
      date: addDays(BASELINE, 12),
      readings: [{ measure: 'sway', value: 250, explanation: 'read again, correct' }],
    });
    await missVisit(act, { subjectCode: 'N002', planned: 'Week 4', reason: 'away' });
    await changeSubjectState(act, {
      subjectCode: 'N003',
      state: 'died',
      date: addDays(BASELINE, 30),
      reason: 'reported by the family',
    });
  });
  await study.act('unblinded statistician', (act) =>
    enterAllocation(
      act,
      ['N001', 'N002', 'N003', 'S001'].map((subjectCode, at) => ({
        subjectCode,
        armName: SETUP.arms?.[at % 2] ?? '',
      })),
    ),
  );
}

const read = async (role: string, path: string, status = 200, of = study) => {
  const agent = agents.get(role);
  if (!agent) {
    throw new Error(`nobody is ${role}`);
  }
  return agent.get(`/api/studies/${of.uid}${path}`).expect(status);
};
const list = async (role: string, query = ''): Promise<SubjectList> =>
  (await read(role, `/subjects${query}`)).body;
const codes = (found: SubjectList) => found.rows.map((row) => row.code);
const uidOf = async (code: string) => {
  const [row] = await app.database.query<{ uid: string }>(
    'SELECT uid FROM subject WHERE code = $1 AND study_id = $2',
    [code, study.id],
  );
  return row?.uid ?? '';
};

describe('the list', () => {
  it('shows a coordinator the own site, and a monitor and the owner every site', async () => {
    const own = await list('coordinator');
    expect(codes(own)).toEqual(['n-extra', 'N001', 'N002', 'N003', 'N010']);
    expect(own).toMatchObject({
      total: 5,
      totalUnfiltered: 5,
      sites: [{ code: 'NOR', name: 'North hall' }],
    });
    for (const role of ['monitor', 'owner']) {
      const all = await list(role);
      expect(all.total).toBe(6);
      expect(all.sites.map((site) => site.code)).toEqual(['NOR', 'SOU']);
    }
    expect(codes(await list('coordinator', '?site=SOU'))).toEqual([]);
  });

  it('draws each cord from what is planned and logged', async () => {
    const { rows } = await list('coordinator');
    const cord = (code: string) => rows.find((row) => row.code === code)?.cord;
    const knots = (code: string) =>
      cord(code)?.visits.map((knot) => [knot.name, knot.state, knot.day, knot.outOfWindow]);
    // 1 December is day 61: the window of Week 8, days 51 to 61, closes today.
    expect(cord('N010')?.today).toBe(61);
    expect(knots('N010')).toEqual([
      ['Baseline', 'overdue', null, false],
      ['Week 4', 'overdue', null, false],
      ['Week 8', 'closing', null, false],
    ]);
    expect(knots('N001')).toEqual([
      ['Baseline', 'done', 0, false],
      ['unscheduled', 'unscheduled', 12, false],
      ['Week 4', 'partly done', 40, true],
      ['Week 8', 'closing', null, false],
    ]);
    expect(knots('N002')?.[1]).toEqual(['Week 4', 'missed', null, false]);
    expect(cord('N003')?.end).toEqual({ word: 'died', day: 30 });
    expect(cord('N003')?.visits[2]).toMatchObject({ state: 'upcoming', afterEnd: true });
    expect(rows.find((row) => row.code === 'N001')).toMatchObject({
      visitsDone: 2,
      visitsDue: 3,
      lastVisit: addDays(BASELINE, 40),
    });
  });

  it('is filtered by site, state and a part of the code', async () => {
    expect(codes(await list('monitor', '?state=died'))).toEqual(['N003']);
    expect(codes(await list('monitor', '?site=SOU'))).toEqual(['S001']);
    expect(codes(await list('monitor', '?text=001'))).toEqual(['N001', 'S001']);
    expect(codes(await list('monitor', '?text=n00'))).toEqual(['N001', 'N002', 'N003']);
    expect(codes(await list('monitor', '?text=%25'))).toEqual([]);
    expect(await list('monitor', '?text=001')).toMatchObject({ total: 2, totalUnfiltered: 6 });
  });

  it.each([
    ['code', 'desc', 'S001'],
    ['site', 'desc', 'S001'],
    ['state', 'asc', 'N003'],
    ['visitsDone', 'desc', 'N001'],
    ['lastVisit', 'desc', 'N001'],
    ['baselineDate', 'asc', 'n-extra'],
  ])('is sorted by %s %s', async (sort, direction, first) => {
    const found = await list('monitor', `?sort=${sort}&direction=${direction}`);
    expect(found.rows[0]?.code).toBe(first);
  });

  it('comes in pages that neither repeat nor lose a row', async () => {
    const seen: string[] = [];
    for (const page of [1, 2, 3, 4]) {
      seen.push(...codes(await list('monitor', `?page=${page}&pageSize=2&sort=baselineDate`)));
    }
    expect(seen).toHaveLength(6);
    expect(new Set(seen).size).toBe(6);
    await read('monitor', '/subjects?pageSize=201', 422);
    await read('monitor', '/subjects?sort=arm', 422);
  });

  it('is a file too, with the same filter, and the trail says who took it', async () => {
    const answer = await read('coordinator', '/subjects.csv?sort=code&text=N00');
    expect(answer.headers['content-type']).toContain('text/csv');
    expect(answer.headers['content-disposition']).toContain('attachment');
    expect(answer.text.trimEnd().split('\r\n')).toEqual([
      'subject,site,state,state_date,baseline_date,visits_done,visits_due,last_visit',
      'N001,NOR,enrolled,2026-09-28,2026-10-01,2,3,2026-11-10',
      'N002,NOR,enrolled,2026-09-28,2026-10-01,0,3,',
      'N003,NOR,died,2026-10-31,2026-10-01,0,1,',
    ]);
    const [entry] = await app.database.query(
      `SELECT actor_name, role_then, after FROM audit.entry WHERE action = 'subject list downloaded'`,
    );
    expect(entry).toMatchObject({
      actor_name: 'Kit coordinator',
      role_then: 'coordinator',
      after: { text: 'N00' },
    });
  });
});

describe('one subject', () => {
  it('comes whole: limits, what was not done, revisions and who entered it', async () => {
    const uid = await uidOf('N001');
    const before: SubjectDetail = (await read('coordinator', `/subjects/${uid}`)).body;
    const sway = before.visits[0]?.readings.find((reading) => reading.measure === 'sway');
    await study.act('coordinator', (act) =>
      correctReading(act, {
        readingUid: sway?.id ?? '',
        version: 1,
        value: 65.1,
        reason: 'transcription error',
      }),
    );
    const subject: SubjectDetail = (await read('coordinator', `/subjects/${uid}`)).body;
    expect(subject).toMatchObject({
      code: 'N001',
      site: { code: 'NOR', timeZone: 'Europe/London' },
      consentVersion: '1.2',
      once: [{ measure: 'sex', choice: 'f' }],
    });
    const [baseline, unscheduled, week4, week8] = subject.visits;
    expect(baseline?.readings[0]).toMatchObject({
      value: 65.1,
      enteredBy: 'Kit owner',
      fromImport: null,
      revisions: [
        {
          by: 'Kit coordinator',
          old: { value: 61.5 },
          new: { value: 65.1 },
          reason: 'transcription error',
        },
      ],
    });
    expect(unscheduled).toMatchObject({
      unscheduledReason: 'fell at home',
      readings: [{ value: 250, implausible: true, explanation: 'read again, correct' }],
    });
    expect(week4).toMatchObject({
      state: 'partly done',
      outOfWindow: true,
      targetDate: '2026-10-29',
      windowFromDate: '2026-10-24',
      windowToDate: '2026-11-03',
      readings: [
        { measure: 'sway', value: null, limit: { sign: '<', value: 20 } },
        { measure: 'falls', value: null, notDone: 'subject refused' },
      ],
    });
    expect(week8).toMatchObject({ id: null, state: 'closing', loggedBy: null, readings: [] });
  });

  it('does not exist for a coordinator of another site, in another study, or by a wrong id', async () => {
    const elsewhere = await uidOf('S001');
    await read('monitor', `/subjects/${elsewhere}`);
    const told = async (path: string, role = 'coordinator', of = study) => {
      const { body } = await read(role, path, 404, of);
      return { code: body.code, detail: body.detail };
    };
    const words = await told('/subjects/0193a000-0000-7000-8000-000000000001');
    expect(await told(`/subjects/${elsewhere}`)).toEqual(words);
    expect(await told('/subjects/1')).toEqual(words);
    expect(await told(`/subjects/${elsewhere}`, 'monitor', other)).toEqual(words);
    expect(await told('/subjects', 'monitor', other)).toEqual(words);
  });
});

describe('finding by code', () => {
  it('gives the exact one first, and none out of reach', async () => {
    const find = async (role: string, code: string) =>
      (await read(role, `/find?code=${code}`)).body.rows.map((row: { code: string }) => row.code);
    expect(await find('monitor', 'N0')).toEqual(['N001', 'N002', 'N003', 'N010']);
    expect(await find('monitor', 'n001')).toEqual(['N001']);
    expect(await find('coordinator', 'S')).toEqual([]);
    await read('monitor', '/find?code=', 422);
  });
});

describe('masking', () => {
  it('shows neither arm nor code to anyone who reads subjects', async () => {
    const keys = await app.database.query<{ code: string }>('SELECT code FROM sealed.code_key');
    const uid = await uidOf('N001');
    const paths = ['/subjects', '/subjects.csv', `/subjects/${uid}`, '/find?code=N'];
    for (const role of ['coordinator', 'monitor', 'owner']) {
      for (const path of paths) {
        const { text } = await read(role, path);
        expect(text).not.toMatch(/Walking|"arm|allocation/i);
        for (const { code } of keys) {
          expect(text).not.toContain(`"${code}"`);
        }
      }
    }
    await read('analyst', '/subjects', 403);
    await read('analyst', `/subjects/${uid}`, 403);
  });

  it('names arms in the set-up, which is read by the owner alone', async () => {
    const { body } = await read('owner', '/setup');
    expect(body.arms).toEqual(SETUP.arms);
    expect(body.measures.map((measure: { shortName: string }) => measure.shortName)).toEqual([
      'sway',
      'falls',
      'sex',
    ]);
    for (const role of ['coordinator', 'monitor', 'analyst']) {
      await read(role, '/setup', 403);
    }
  });
});
