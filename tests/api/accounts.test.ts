import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import { makePerson, PASSWORD, type TestPerson } from './people.ts';

let app: TestApp;
let adair: TestPerson;
let admin: TestAgent;

beforeAll(async () => {
  app = await startTestApp();
  adair = await makePerson(app.database, 'Adair', { administrator: true });
  admin = await app.signedIn(adair.email, PASSWORD);
});
afterAll(() => app.close());

const create = (body: object) => admin.post('/api/accounts').send(body);
const knock = (agent: TestAgent, email: string, password: string) =>
  agent.post('/api/sign-in').send({ email, password });
const reason = 'asked for by the person';

describe('a new account', () => {
  it('gets a temporary password once, which has to be changed, and a letter without it', async () => {
    const made = await create({
      email: 'nell@new.example',
      name: 'Nell Byrne',
      administrator: false,
    });
    expect(made.status).toBe(201);
    expect(made.body.account).toMatchObject({
      state: 'active',
      mustChangePassword: true,
      version: 1,
    });
    expect(made.body.letterSent).toBe(true);
    const temporary: string = made.body.temporaryPassword;
    expect(temporary).toMatch(/^([a-hj-km-np-z2-9]{5}-){3}[a-hj-km-np-z2-9]{5}$/);

    const letter = (await app.letters()).find(({ to }) => to === 'nell@new.example');
    expect(letter?.subject).toBe('An account in Tetherline was made for you');
    expect(JSON.stringify(letter)).not.toContain(temporary);
    const stored = await app.database.query(
      `SELECT kind, state, sent_at IS NOT NULL AS sent FROM letter`,
    );
    expect(stored).toEqual([{ kind: 'account created', state: 'sent', sent: true }]);
    const trail = await app.database.query<{ body: string }>('SELECT body FROM audit.entry');
    expect(trail.map(({ body }) => body).join()).not.toContain(temporary);

    const list = await admin.get('/api/accounts?text=nell');
    expect(JSON.stringify(list.body)).not.toContain(temporary);
    await knock(app.visitor(), 'NELL@new.example', temporary).expect(200);
  });

  it('is refused for an address in use, however it is spelled, also by two at once', async () => {
    const body = { email: 'ada@new.example', name: 'Ada', administrator: false };
    const answers = await Promise.all([
      create(body),
      create({ ...body, email: 'ADA@new.example' }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    const again = await create({ ...body, email: 'Ada@New.Example' });
    expect([again.status, again.body.code]).toEqual([409, 'account_exists']);
    expect(again.body.errors).toEqual([
      { path: 'email', message: 'An account with this address exists already.' },
    ]);
    const held = await app.database.query(
      `SELECT 1 FROM account WHERE lower(email) = 'ada@new.example'`,
    );
    expect(held).toHaveLength(1);
  });

  it('needs a whole address and a name', async () => {
    const answer = await create({ email: 'nobody', name: '  ', administrator: false });
    expect([answer.status, answer.body.code]).toEqual([422, 'invalid_request']);
    expect(answer.body.errors.map((error: { path: string }) => error.path)).toEqual([
      'email',
      'name',
    ]);
  });
});

describe('closing and opening an account', () => {
  it('ends its sessions at once, and keeps who did it and why', async () => {
    const person = await makePerson(app.database, 'Closing');
    const agent = await app.signedIn(person.email, PASSWORD);
    const closed = await admin
      .post(`/api/accounts/${person.uid}/disable`)
      .send({ version: 1, reason: 'left the team' });
    expect(closed.body).toMatchObject({ state: 'disabled', version: 2 });
    await agent.get('/api/me').expect(401);
    await agent.post('/api/refresh').expect(401);
    await knock(app.visitor(), person.email, PASSWORD).expect(401);
    const [entry] = await app.database.query(
      `SELECT actor_name, role_then, reason, before, after FROM audit.entry
        WHERE action = 'account disabled' AND entity_uid = $1`,
      [person.uid],
    );
    expect(entry).toEqual({
      actor_name: 'Adair',
      role_then: 'administrator',
      reason: 'left the team',
      before: { state: 'active', mustChangePassword: false },
      after: { state: 'disabled', mustChangePassword: false, sessionsEnded: 1 },
    });
    const opened = await admin
      .post(`/api/accounts/${person.uid}/enable`)
      .send({ version: 2, reason });
    expect(opened.body).toMatchObject({ state: 'active', disabledAt: null });
    await knock(app.visitor(), person.email, PASSWORD).expect(200);
    // What ended stays ended.
    await agent.get('/api/me').expect(401);
  });

  it('refuses a stale version, a second time, and one’s own account', async () => {
    const person = await makePerson(app.database, 'Stale');
    const close = (uid: string, version: number) =>
      admin.post(`/api/accounts/${uid}/disable`).send({ version, reason });
    const stale = await close(person.uid, 7);
    expect([stale.status, stale.body.code]).toEqual([409, 'stale_version']);
    expect(stale.body.params).toEqual({ given: 7, held: 1 });
    await close(person.uid, 1).expect(200);
    expect((await close(person.uid, 2)).body.code).toBe('account_already');
    expect((await close(adair.uid, 1)).body.code).toBe('account_own');
    await admin.get('/api/me').expect(200);
  });

  it('never closes the last administrator, not even when two close each other', async () => {
    const blair = await makePerson(app.database, 'Blair', { administrator: true });
    const other = await app.signedIn(blair.email, PASSWORD);
    const answers = await Promise.all([
      admin.post(`/api/accounts/${blair.uid}/disable`).send({ version: 1, reason }),
      other.post(`/api/accounts/${adair.uid}/disable`).send({ version: 1, reason }),
    ]);
    const open = await app.database.query(
      'SELECT uid FROM account WHERE administrator AND disabled_at IS NULL',
    );
    expect(open).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    await app.database.query(
      'UPDATE account SET disabled_at = NULL, version = 1 WHERE administrator',
    );
    admin = await app.signedIn(adair.email, PASSWORD);
  });
});

describe('resetting access', () => {
  it('gives a new temporary password, ends the sessions, and sends a letter without it', async () => {
    const person = await makePerson(app.database, 'Reset');
    const agent = await app.signedIn(person.email, PASSWORD);
    const answer = await admin
      .post(`/api/accounts/${person.uid}/reset`)
      .send({ version: 1, reason });
    expect(answer.status).toBe(200);
    await agent.get('/api/me').expect(401);
    await knock(app.visitor(), person.email, PASSWORD).expect(401);
    const signed = await knock(app.visitor(), person.email, answer.body.temporaryPassword);
    expect(signed.body.mustChangePassword).toBe(true);
    const letter = (await app.letters()).find(({ to }) => to === person.email);
    expect(letter?.subject).toBe('Your access to Tetherline was reset');
    expect(JSON.stringify(letter)).not.toContain(answer.body.temporaryPassword);
  });
});

describe('the list', () => {
  it('sorts, filters and pages, with the total of the filter', async () => {
    const names = async (query: string) => {
      const answer = await admin.get(`/api/accounts?${query}`).expect(200);
      return answer.body as { rows: { name: string; state: string }[]; total: number };
    };
    const all = await names('pageSize=200');
    expect(all.total).toBe(all.rows.length);
    const sorted = all.rows.map(({ name }) => name.toLowerCase());
    expect(sorted).toEqual([...sorted].sort());
    const second = await names('pageSize=2&page=2');
    expect(second.total).toBe(all.total);
    expect(second.rows.map(({ name }) => name)).toEqual(
      all.rows.slice(2, 4).map(({ name }) => name),
    );
    const past = await names('pageSize=2&page=900');
    expect(past).toEqual({ rows: [], total: all.total });
    const disabled = await names('state=disabled');
    expect(disabled.rows.every(({ state }) => state === 'disabled')).toBe(true);
    expect((await names('text=%25')).total).toBe(0);
    expect((await names('kind=administrator')).rows.map(({ name }) => name)).toContain('Adair');
    const wrong = await admin.get('/api/accounts?pageSize=1000');
    expect([wrong.status, wrong.body.errors]).toEqual([
      422,
      [{ path: 'pageSize', message: 'At most 200.' }],
    ]);
  });

  it('holds no password and no hash of one', async () => {
    const answer = await admin.get('/api/accounts?pageSize=200');
    expect(answer.text).not.toContain('argon2');
    expect(answer.text.toLowerCase()).not.toContain('passwordhash');
  });
});
