/** The application on a test database, and people signed in to it by their cookies. */
import pino from 'pino';
import request from 'supertest';
import { createApp } from '../../api/app.ts';
import { loadConfig } from '../../api/config.ts';
import { deriveSecrets } from '../../api/secrets.ts';
import type { TestDatabase } from '../support/test-database.ts';
import { PASSWORD, type Person, type StudyForTests } from './analysis-study.ts';

export type Answer = request.Response;

export interface AnalystApp {
  /** Signs in once a person; answers 401 to null. */
  get(person: Person | null, path: string): Promise<Answer>;
  post(person: Person | null, path: string, body: object, key?: string): Promise<Answer>;
}

/** What the analyst's routes never touch; a call would be a mistake. */
function untouched<T extends object>(name: string): T {
  return new Proxy({} as T, {
    get: () => {
      throw new Error(`${name} is not for these routes`);
    },
  });
}

/** @param study paths that begin with a slash are below this study's address */
export async function appFor(database: TestDatabase, study: StudyForTests): Promise<AnalystApp> {
  const app = createApp({
    databases: await database.databases(),
    store: untouched('the object store'),
    mailer: untouched('the mailer'),
    jobs: untouched('the queue'),
    clock: () => study.clock.now,
    config: loadConfig({ LOG_LEVEL: 'silent' }),
    secrets: deriveSecrets('a'.repeat(64), 'tests'),
    logger: pino({ level: 'silent' }),
    threads: study.threads,
    importThreads: untouched('the parsing threads'),
  });
  const sessions = new Map<Person, string[]>();
  const cookiesOf = async (person: Person): Promise<string[]> => {
    const held = sessions.get(person);
    if (held) {
      return held;
    }
    const answer = await request(app)
      .post('/api/sign-in')
      .send({ email: `${person}@${study.studyId}.example`, password: PASSWORD });
    if (answer.status !== 200) {
      throw new Error(`${person} could not sign in: ${answer.status} ${answer.text}`);
    }
    const cookies = ((answer.headers['set-cookie'] ?? []) as unknown as string[]).map(
      (cookie) => cookie.split(';')[0] ?? '',
    );
    sessions.set(person, cookies);
    return cookies;
  };
  const address = (path: string) => `/api/studies/${study.studyUid}${path}`;
  return {
    async get(person, path) {
      const asked = request(app).get(address(path));
      return person === null ? asked : asked.set('Cookie', await cookiesOf(person));
    },
    async post(person, path, body, key) {
      const asked = request(app).post(address(path)).send(body);
      if (key !== undefined) {
        asked.set('Idempotency-Key', key);
      }
      return person === null ? asked : asked.set('Cookie', await cookiesOf(person));
    },
  };
}
