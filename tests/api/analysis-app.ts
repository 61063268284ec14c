/** The whole application with one study in it, and people signed in to it by their cookies. */
import type request from 'supertest';
import type TestAgent from 'supertest/lib/agent.js';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import {
  makeStudy,
  PASSWORD,
  type Person,
  type StudyForTests,
  type StudyOptions,
} from './analysis-study.ts';

type Answer = request.Response;

export interface AnalystApp {
  database: TestApp['database'];
  study: StudyForTests;
  /** Paths are below the address of the study. Signs in once a person; null is nobody. */
  get(person: Person | null, path: string): Promise<Answer>;
  post(person: Person | null, path: string, body: object, key?: string): Promise<Answer>;
  close(): Promise<void>;
}

export async function openAnalysis(options: StudyOptions): Promise<AnalystApp> {
  const app = await startTestApp();
  const study = await makeStudy(app, options);
  const agents = new Map<Person | null, Promise<TestAgent>>([
    [null, Promise.resolve(app.visitor())],
  ]);
  const agentOf = (person: Person | null): Promise<TestAgent> => {
    const agent =
      agents.get(person) ?? app.signedIn(`${person}@${study.studyId}.example`, PASSWORD);
    agents.set(person, agent);
    return agent;
  };
  const address = (path: string) => `/api/studies/${study.studyUid}${path}`;
  return {
    database: app.database,
    study,
    async get(person, path) {
      return (await agentOf(person)).get(address(path));
    },
    async post(person, path, body, key) {
      const asked = (await agentOf(person)).post(address(path)).send(body);
      return key === undefined ? asked : asked.set('Idempotency-Key', key);
    },
    close: app.close,
  };
}
