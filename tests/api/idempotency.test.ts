/** The same act asked twice with one key: done once, answered twice. */
import { pino } from 'pino';
import request from 'supertest';
import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { createApp } from '../../api/app.ts';
import { featureRoutes } from '../../api/features/index.ts';
import { Problem } from '../../api/http/problems.ts';
import { defineRoute } from '../../api/http/route.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import { makePerson, PASSWORD, type TestPerson } from './people.ts';

let app: TestApp;
let mira: TestPerson;
let agent: TestAgent;
let done = 0;
let hold: Promise<void> = Promise.resolve();

const act = (path: string, sealed: boolean) =>
  defineRoute({
    method: 'post',
    path,
    summary: 'An act that counts how often it is done',
    access: 'signed in',
    idempotent: true,
    sealed,
    body: z.object({ refuse: z.boolean() }),
    status: 201,
    answer: z.object({ nth: z.number() }),
    handler: async ({ body }) => {
      await hold;
      if (body.refuse) throw new Problem('study_closed');
      done += 1;
      return { nth: done, hidden: 'not in the contract' };
    },
  });

beforeAll(async () => {
  app = await startTestApp();
  const routes = [...featureRoutes, act('/api/act', false), act('/api/sealed-act', true)];
  const withActs = createApp({ ...app.deps, logger: pino({ level: 'silent' }) }, routes);
  mira = await makePerson(app.database, 'Mira');
  agent = request.agent(withActs).set('Origin', app.address);
  await agent.post('/api/sign-in').send({ email: mira.email, password: PASSWORD }).expect(200);
});
afterAll(() => app.close());
beforeEach(() => {
  done = 0;
  hold = Promise.resolve();
});

const send = (key: string | null, body: object = { refuse: false }, path = '/api/act') => {
  const call = agent.post(path);
  if (key !== null) call.set('Idempotency-Key', key);
  return call.send(body);
};

describe('a key', () => {
  it('gets the first answer again, byte for byte', async () => {
    const first = await send('key-number-1');
    const second = await send('key-number-1');
    expect([first.status, first.text]).toEqual([201, '{"nth":1}']);
    expect([second.status, second.text]).toEqual([201, '{"nth":1}']);
    expect(second.headers['idempotent-replay']).toBe('true');
    expect(done).toBe(1);
    expect((await send('key-number-2')).body).toEqual({ nth: 2 });
    expect((await send(null)).body).toEqual({ nth: 3 });
  });

  it('sent twice at once lets one through', async () => {
    let go: () => void = () => undefined;
    hold = new Promise((resolve) => {
      go = resolve;
    });
    const first = send('key-at-once').then((answer) => answer);
    const second = await new Promise<request.Response>((resolve) => {
      setTimeout(() => resolve(send('key-at-once')), 150);
    });
    go();
    expect([second.status, second.body.code]).toEqual([409, 'idempotency_running']);
    expect((await first).status).toBe(201);
    expect(done).toBe(1);
  });

  it('of a refused request is free again', async () => {
    const refused = await send('key-refused', { refuse: true });
    expect(refused.status).toBe(409);
    const mended = await send('key-refused', { refuse: false });
    expect([mended.status, mended.body]).toEqual([201, { nth: 1 }]);
  });

  it('belongs to one request: with another body it is refused', async () => {
    await send('key-of-a-body');
    const other = await send('key-of-a-body', { refuse: true });
    expect([other.status, other.body.code]).toEqual([422, 'idempotency_key_reused']);
    const form = await send('no!');
    expect([form.status, form.body.code]).toEqual([400, 'idempotency_key_form']);
    expect(done).toBe(1);
  });

  it('of a sealed route keeps no body, and a second try says that it is done', async () => {
    const first = await send('key-sealed', undefined, '/api/sealed-act');
    expect(first.body).toEqual({ nth: 1 });
    const second = await send('key-sealed', undefined, '/api/sealed-act');
    expect([second.status, second.body.code]).toEqual([409, 'already_done']);
    const rows = await app.database.query(
      `SELECT status, body FROM idempotency WHERE key = 'key-sealed'`,
    );
    expect(rows).toEqual([{ status: 201, body: null }]);
  });

  it('left behind by a lost server can be taken over after two minutes', async () => {
    await send('key-lost-one');
    await app.database.query(
      `UPDATE idempotency SET status = NULL, body = NULL WHERE key = 'key-lost-one'`,
    );
    expect((await send('key-lost-one')).status).toBe(409);
    app.clock.advance(121_000);
    expect((await send('key-lost-one')).body).toEqual({ nth: 2 });
  });
});
