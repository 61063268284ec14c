/** An application with a masked study, one person a duty, and another study with people of its own. */
import type TestAgent from 'supertest/lib/agent.js';
import { inTransaction } from '../../../api/audit/transaction.ts';
import { type StudyRole, studyRoles } from '../../../api/contracts/common.ts';
import { setupFileSchema } from '../../../api/contracts/setup.ts';
import { createStudyFromSetup } from '../../../api/features/setup/service.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';
import { giveRole, makePerson, PASSWORD, type TestPerson } from '../people.ts';
import type { Who } from './who.ts';

export interface WorldStudy {
  id: string;
  uid: string;
}

export interface World {
  app: TestApp;
  study: WorldStudy;
  otherStudy: WorldStudy;
  people: Record<Exclude<Who, 'anonymous'>, TestPerson>;
  /** Someone without any duty, new at every call. */
  newPerson(): Promise<TestPerson>;
  agent(who: Who): Promise<TestAgent>;
  query<Row extends Record<string, unknown>>(sql: string, values?: unknown[]): Promise<Row[]>;
  /** Things that rows of one noun share, made once; the key is theirs. */
  once<T>(key: string, make: () => Promise<T>): Promise<T>;
  close(): Promise<void>;
}

/** Of a masked study, so that no answer may hold one but the set-up itself. */
export const ARMS = ['Slow walk', 'Brisk walk'] as const;

const setup = (shortName: string) => ({
  format: 'tetherline-setup/1',
  study: { name: `Study ${shortName}`, shortName, masked: true },
  sites: [
    { code: 'elm', name: 'Elm', timeZone: 'UTC' },
    { code: 'fir', name: 'Fir', timeZone: 'Europe/Zurich' },
  ],
  arms: [...ARMS],
  measures: [
    {
      shortName: 'weight',
      label: 'Body weight',
      unit: 'kg',
      decimals: 1,
      nature: 'positive',
      plausibleLow: 40,
      plausibleHigh: 120,
      impossibleLow: 20,
      impossibleHigh: 300,
    },
  ],
  visits: [
    { name: 'Start', targetDay: 0, windowBefore: 0, windowAfter: 3 },
    { name: 'Week 2', targetDay: 14, windowBefore: 4, windowAfter: 4 },
    { name: 'Week 4', targetDay: 28, windowBefore: 4, windowAfter: 4 },
  ],
});

export async function makeWorld(): Promise<World> {
  const app = await startTestApp({ work: true });
  const { database } = app;
  const db = app.deps.databases.masked;
  const studyOf = async (name: string): Promise<WorldStudy> => {
    const study = await inTransaction(db, null, (tx) =>
      createStudyFromSetup(tx, app.clock.now, setupFileSchema.parse(setup(name))),
    );
    return { id: study.id, uid: study.uid };
  };
  const study = await studyOf('main');
  const otherStudy = await studyOf('other');
  const people = {} as World['people'];
  for (const role of studyRoles) {
    people[role] = await makePerson(database, `The ${role}`);
    await giveRole(database, study.id, people[role], role);
  }
  people.administrator = await makePerson(database, 'The administrator', { administrator: true });
  people.stranger = await makePerson(database, 'The stranger');
  const compatible: StudyRole[] = ['owner', 'coordinator', 'monitor', 'analyst', 'safety officer'];
  for (const role of compatible) await giveRole(database, otherStudy.id, people.stranger, role);

  const agents = new Map<Who, Promise<TestAgent>>();
  const made = new Map<string, Promise<unknown>>();
  let count = 0;
  return {
    app,
    study,
    otherStudy,
    people,
    newPerson: () => {
      count += 1;
      return makePerson(database, `Newcomer ${'n'.repeat(count)}`);
    },
    agent(who) {
      if (who === 'anonymous') return Promise.resolve(app.visitor());
      const agent = agents.get(who) ?? app.signedIn(people[who].email, PASSWORD);
      agents.set(who, agent);
      return agent;
    },
    query: (sql, values) => database.query(sql, values),
    once<T>(key: string, make: () => Promise<T>): Promise<T> {
      const held = (made.get(key) as Promise<T> | undefined) ?? make();
      made.set(key, held);
      return held;
    },
    close: app.close,
  };
}
