/** The queue as a whole: what is started with a transaction is done once, told as it goes, and can be stopped. */
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { setTimeout as wait } from 'node:timers/promises';
import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { jobSchema } from '../../api/contracts/jobs.ts';
import { Problem } from '../../api/http/problems.ts';
import { defineJob, type JobRun } from '../../api/jobs/jobs.ts';
import { openQueue, type Queue } from '../../api/jobs/queue.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import { makePerson, PASSWORD, type TestPerson } from './people.ts';

let app: TestApp;
let worker: Queue;
let mira: TestPerson;
let runs: string[] = [];
let upkeeps = 0;

/** Steps that wait for the test to let them go on. */
let letGo: () => void = () => undefined;
const held = () =>
  new Promise<void>((resolve) => {
    letGo = resolve;
  });
let gate: Promise<void> = Promise.resolve();

const kinds = [
  defineJob('count', async (run: JobRun) => {
    runs.push(run.jobUid);
    await run.progress(1, 2);
    await gate;
    if (await run.cancelled()) return;
    await run.progress(2, 2);
  }),
  defineJob('refuse', async () => {
    throw new Problem('study_closed');
  }),
  defineJob('fail', async (run: JobRun) => {
    runs.push(run.jobUid);
    throw new Error('value 71.3 of subject AL-001');
  }),
];

beforeAll(async () => {
  app = await startTestApp();
  mira = await makePerson(app.database, 'Mira');
  // A second process with the same database: it does the work, the first one tells of it.
  worker = await openQueue({
    url: app.database.urls.masked,
    db: app.deps.databases.masked,
    clock: app.deps.clock,
    logger: pino({ level: 'silent' }),
  });
  await worker.work(kinds, async () => {
    upkeeps += 1;
  });
});
afterAll(async () => {
  letGo();
  await worker.close();
  await app.close();
});

const start = (kind: string): Promise<string> =>
  app.deps.databases.masked.transaction((manager) =>
    app.deps.jobs.start(manager, { kind, subjectUid: null, studyId: null, accountId: mira.id }),
  );

async function until<T>(read: () => Promise<T>, good: (value: T) => boolean): Promise<T> {
  const end = Date.now() + 20_000;
  for (;;) {
    const value = await read();
    if (good(value) || Date.now() > end) return value;
    await wait(50);
  }
}

async function reader() {
  const agent = await app.signedIn(mira.email, PASSWORD);
  return async (job: string) =>
    jobSchema.parse((await agent.get(`/api/jobs/${job}`).expect(200)).body);
}

describe('work in the queue', () => {
  it('begins only where its transaction commits, and is done once', async () => {
    runs = [];
    await expect(
      app.deps.databases.masked.transaction(async (manager) => {
        await app.deps.jobs.start(manager, {
          kind: 'count',
          subjectUid: null,
          studyId: null,
          accountId: mira.id,
        });
        throw new Error('rolled back');
      }),
    ).rejects.toThrow('rolled back');
    const job = await start('count');
    const read = await reader();
    const end = await until(
      () => read(job),
      ({ state }) => state === 'done',
    );
    expect(end).toMatchObject({ state: 'done', done: 2, total: 2, problem: null });
    expect(runs).toEqual([job]);
  });

  it('that is refused says why and is not tried again; its queue entry holds an id and nothing else', async () => {
    const job = await start('refuse');
    const read = await reader();
    const end = await until(
      () => read(job),
      ({ state }) => state === 'failed',
    );
    expect(end.problem).toEqual({ code: 'study_closed', params: {} });
    const [entry] = await app.database.query<{ data: object }>(
      `SELECT data FROM queue.job WHERE data->>'jobUid' = $1`,
      [job],
    );
    expect(entry?.data).toEqual({ jobUid: job });
  });

  it('that fails is tried again, and tells nobody the value it failed on', async () => {
    runs = [];
    const job = await start('fail');
    const read = await reader();
    const end = await until(
      () => read(job),
      ({ state }) => state === 'failed',
    );
    expect(end.problem).toEqual({ code: 'failed', params: { requestId: job } });
    expect(runs).toEqual([job, job, job]);
  });

  it('stops at its next step when asked', async () => {
    gate = held();
    const job = await start('count');
    const read = await reader();
    await until(
      () => read(job),
      ({ done }) => done === 1,
    );
    const agent = await app.signedIn(mira.email, PASSWORD);
    const asked = await agent.post(`/api/jobs/${job}/cancel`).expect(200);
    expect(asked.body).toMatchObject({ state: 'running', cancelRequested: true });
    letGo();
    const end = await until(
      () => read(job),
      ({ state }) => state === 'cancelled',
    );
    expect(end).toMatchObject({ state: 'cancelled', done: 1 });
    const again = await agent.post(`/api/jobs/${job}/cancel`);
    expect([again.status, again.body.code]).toEqual([409, 'job_finished']);
  });

  it('asks for the hourly upkeep once, whoever asks', async () => {
    await until(
      async () => upkeeps,
      (count) => count > 0,
    );
    expect(upkeeps).toBe(1);
  });
});

describe('the stream of a job', () => {
  let server: Server;
  let address: string;
  beforeAll(async () => {
    server = createServer(app.app);
    await new Promise<void>((ready) => server.listen(0, '127.0.0.1', ready));
    address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  });
  afterAll(() => {
    server.closeAllConnections();
    server.close();
  });

  const cookie = async (): Promise<string> => {
    const answer = await app
      .visitor()
      .post('/api/sign-in')
      .send({ email: mira.email, password: PASSWORD })
      .expect(200);
    const cookies = answer.headers['set-cookie'] as unknown as string[];
    return cookies.map((one) => one.split(';')[0]).join('; ');
  };

  async function follow(job: string, onFirst: () => void) {
    const answer = await fetch(`${address}/api/jobs/${job}/events`, {
      headers: { cookie: await cookie() },
      signal: AbortSignal.timeout(25_000),
    });
    expect(answer.headers.get('content-type')).toContain('text/event-stream');
    let text = '';
    for await (const piece of answer.body ?? []) {
      text += Buffer.from(piece).toString('utf8');
      if (text.includes('"done":1')) onFirst();
    }
    return text
      .split('\n\n')
      .filter((event) => event.startsWith('data: '))
      .map((event) => jobSchema.parse(JSON.parse(event.slice(6))));
  }

  it('tells each change as it comes and ends with the work', async () => {
    gate = held();
    const job = await start('count');
    const told = await follow(job, letGo);
    expect(told.at(-1)).toMatchObject({ state: 'done', done: 2 });
    expect(told.map(({ done }) => done)).toEqual(told.map(({ done }) => done).sort());
    expect(new Set(told.map((one) => JSON.stringify(one))).size).toBe(told.length);
  });

  it('ends when the session ends', async () => {
    gate = held();
    const job = await start('count');
    const told = await follow(job, () => {
      void app.database.query('UPDATE session SET revoked_at = now() WHERE account_id = $1', [
        mira.id,
      ]);
    });
    letGo();
    expect(told.at(-1)?.state).toBe('running');
  });
});
