/** A study with the sleepstudy readings of lme4, made through the services, for tests of the analyst's side. */
import { readFileSync } from 'node:fs';
import type { Actor } from '../../api/audit/actor.ts';
import { inTransaction } from '../../api/audit/transaction.ts';
import { hashPassword } from '../../api/auth/passwords.ts';
import { type SetupFileInput, setupFileSchema } from '../../api/contracts/setup.ts';
import { enterAllocation } from '../../api/features/allocation/service.ts';
import { addDays } from '../../api/features/cuts/days.ts';
import type { StudyScope } from '../../api/features/cuts/scope.ts';
import { createStudyFromSetup } from '../../api/features/setup/service.ts';
import { enrolSubject } from '../../api/features/subjects/service.ts';
import { actInStudy, type StudyAct } from '../../api/features/subjects/study-act.ts';
import { logVisit } from '../../api/features/visits/service.ts';
import type { Databases } from '../../database/data-source.ts';
import type { StudyRole } from '../../database/entities/index.ts';
import type { TestApp } from '../support/test-app.ts';
import type { TestDatabase } from '../support/test-database.ts';

export const PASSWORD = 'a lamp beside the harbour';
export const ARMS = ['Kestrel drill', 'Plover drill'] as const;
export const BASELINE = '2026-11-01';

export const PEOPLE = {
  analyst: 'analyst',
  second: 'analyst',
  owner: 'owner',
  coordinator: 'coordinator',
  monitor: 'monitor',
  statistician: 'unblinded statistician',
  board: 'board member',
  safety: 'safety officer',
} as const satisfies Record<string, StudyRole>;
export type Person = keyof typeof PEOPLE;

export interface StudyForTests {
  studyId: string;
  studyUid: string;
  clock: TestApp['clock'];
  actor(person: Person): Actor;
  scope(person: Person): StudyScope;
  act<T>(person: Person, work: (act: StudyAct) => Promise<T>): Promise<T>;
}

const setup = (masked: boolean): SetupFileInput => ({
  format: 'tetherline-setup/1',
  study: { name: 'Night watch', shortName: 'night-watch', masked },
  sites: [{ code: 'quay', name: 'Quay', timeZone: 'UTC' }],
  arms: [...ARMS],
  measures: [
    {
      shortName: 'reaction',
      label: 'Reaction time',
      unit: 'ms',
      decimals: 4,
      nature: 'continuous',
    },
    { shortName: 'lapses', label: 'Lapses', nature: 'count' },
    { shortName: 'rested', label: 'Rested', nature: 'yes_no' },
    {
      shortName: 'place',
      label: 'Place',
      nature: 'choice',
      choices: [
        { code: 'home', label: 'At home' },
        { code: 'away', label: 'Away' },
      ],
    },
    { shortName: 'age', label: 'Age', unit: 'years', nature: 'positive', per: 'subject' },
  ],
  visits: Array.from({ length: 10 }, (_, day) => ({ name: `Day ${day}`, targetDay: day })),
});

export interface StudyOptions {
  masked: boolean;
  /** What is logged; lme4's sleepstudy unless said otherwise. */
  load?: (study: StudyForTests) => Promise<void>;
}

/** With the readings, and with the allocation entered: sealed where the study is masked. */
export async function makeStudy(
  app: Pick<TestApp, 'database' | 'clock' | 'deps'>,
  options: StudyOptions,
): Promise<StudyForTests> {
  const { database, clock } = app;
  const { databases, threads } = app.deps;
  const study = await inTransaction(databases.masked, null, (tx) =>
    createStudyFromSetup(tx, clock.now, setupFileSchema.parse(setup(options.masked))),
  );
  const actors = await addPeople(database, study.id);
  const actor = (person: Person): Actor => {
    const found = actors.get(person);
    if (!found) {
      throw new Error(`nobody is ${person}`);
    }
    return found;
  };
  const made: StudyForTests = {
    studyId: study.id,
    studyUid: study.uid,
    clock,
    actor,
    scope: (person) => ({
      db: databaseOf(databases, person),
      actor: actor(person),
      studyId: study.id,
      studyUid: study.uid,
      clock: () => clock.now,
      threads,
    }),
    act: (person, work) =>
      actInStudy(
        {
          db: databaseOf(databases, person),
          actor: actor(person),
          clock: () => clock.now,
          studyUid: study.uid,
          siteIds: null,
        },
        work,
      ),
  };
  await (options.load ?? loadSleepStudy)(made);
  const subjects = await database.query<{ code: string }>('SELECT code FROM subject ORDER BY id');
  await made.act(options.masked ? 'statistician' : 'owner', (act) =>
    enterAllocation(
      act,
      subjects.map(({ code }, at) => ({ subjectCode: code, armName: ARMS[at % 2] ?? ARMS[0] })),
    ),
  );
  return made;
}

function databaseOf(databases: Databases, person: Person) {
  if (person === 'statistician') {
    return databases.open;
  }
  return person === 'board' ? databases.board : databases.masked;
}

async function addPeople(database: TestDatabase, studyId: string): Promise<Map<Person, Actor>> {
  const actors = new Map<Person, Actor>();
  const hash = await hashPassword(PASSWORD);
  for (const [person, role] of Object.entries(PEOPLE) as [Person, StudyRole][]) {
    const email = `${person}@${studyId}.example`;
    const [account] = await database.query<{ id: string; uid: string }>(
      `INSERT INTO account (email, name, password_hash, created_at, time_zone)
       VALUES ($1, $2, $3, '2026-01-01', 'Europe/Zurich') RETURNING id, uid`,
      [email, `Robin ${person}`, hash],
    );
    if (!account) {
      throw new Error('no account was written');
    }
    await database.query(
      `INSERT INTO membership (study_id, account_id, role, created_at) VALUES ($1, $2, $3, '2026-01-01')`,
      [studyId, account.id, role],
    );
    actors.set(person, {
      accountId: account.id,
      accountUid: account.uid,
      name: `Robin ${person}`,
      role,
      sessionUid: null,
      requestId: null,
    });
  }
  return actors;
}

const rows = readFileSync(new URL('../reference/sleepstudy/data.csv', import.meta.url), 'utf8')
  .trim()
  .split('\n')
  .slice(1)
  .map((line) => {
    const [code = '', day = '', reaction = ''] = line.split(',');
    return { code, day: Number(day), reaction: Number(reaction) };
  });

function subjectCodes(): string[] {
  return [...new Set(rows.map((row) => row.code))];
}

/** Enrolled before the baseline that everybody shares. */
export async function enrol(act: StudyAct, code: string): Promise<void> {
  await enrolSubject(act, {
    siteCode: 'quay',
    code,
    state: 'enrolled',
    consentVersion: '1',
    consentDate: '2026-10-30',
    enrolmentDate: '2026-10-31',
    baselineDate: BASELINE,
  });
}

/** lme4's sleepstudy: 18 subjects, days 0 to 9. */
async function loadSleepStudy(study: StudyForTests): Promise<void> {
  await study.act('coordinator', async (act) => {
    for (const [at, code] of subjectCodes().entries()) {
      await enrol(act, code);
      for (const row of rows.filter((one) => one.code === code)) {
        await logVisit(act, {
          subjectCode: code,
          planned: `Day ${row.day}`,
          date: addDays(BASELINE, row.day),
          contactMode: 'in person',
          readings: [
            { measure: 'reaction', value: row.reaction },
            { measure: 'lapses', value: (at + row.day) % 5 },
            { measure: 'rested', value: row.day % 2 },
            { measure: 'place', choice: row.day > 4 ? 'away' : 'home' },
            ...(row.day === 0 ? [{ measure: 'age', value: 30 + at }] : []),
          ],
        });
      }
    }
  });
}
