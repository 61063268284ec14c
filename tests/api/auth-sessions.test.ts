import jwt from 'jsonwebtoken';
import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import { cookieOf, knock, pairOf } from './knock.ts';
import { makePerson, PASSWORD, type TestPerson } from './people.ts';

let app: TestApp;
let mira: TestPerson;
let people = 0;

const MINUTE = 60_000;

beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.close());
beforeEach(async () => {
  // A window of its own for every test, and a person nobody has tried yet.
  const day = 24 * 60 * MINUTE;
  app.clock.now = new Date((Math.floor(app.clock.now.getTime() / day) + 1) * day);
  people += 1;
  mira = await makePerson(app.database, `Mira ${'x'.repeat(people)}`);
});

async function entries(action: string): Promise<Record<string, unknown>[]> {
  return app.database.query(
    `SELECT * FROM audit.entry WHERE chain = 'installation' AND action = $1 ORDER BY seq`,
    [action],
  );
}

describe('a session', () => {
  it('lives by a short token that is renewed, and the old refresh token ends it for both', async () => {
    const first = await knock(app.visitor(), mira.email, PASSWORD);
    const stolen = pairOf(cookieOf(first, 'tether_refresh'));
    app.clock.advance(5 * MINUTE);
    const expired = await app
      .visitor()
      .get('/api/me')
      .set('Cookie', pairOf(cookieOf(first, 'tether_access')));
    expect([expired.status, expired.body.code]).toEqual([401, 'not_signed_in']);

    const renewed = await app.visitor().post('/api/refresh').set('Cookie', stolen).expect(200);
    const access = pairOf(cookieOf(renewed, 'tether_access'));
    const next = pairOf(cookieOf(renewed, 'tether_refresh'));
    expect(next).not.toBe(stolen);
    await app.visitor().get('/api/me').set('Cookie', access).expect(200);

    const reused = await app.visitor().post('/api/refresh').set('Cookie', stolen);
    expect([reused.status, reused.body.code]).toEqual([401, 'session_ended']);
    expect(cookieOf(reused, 'tether_access')).toContain('Expires=Thu, 01 Jan 1970');
    await app.visitor().get('/api/me').set('Cookie', access).expect(401);
    await app.visitor().post('/api/refresh').set('Cookie', next).expect(401);
    const [session] = await app.database.query(
      'SELECT revoked_reason FROM session WHERE account_id = $1',
      [mira.id],
    );
    expect(session).toEqual({ revoked_reason: 'refresh token used twice' });
    expect((await entries('refresh token reused')).at(-1)).toMatchObject({ entity_uid: mira.uid });
  });

  it('gives out one new token when the same one comes twice at once', async () => {
    const first = await knock(app.visitor(), mira.email, PASSWORD);
    const refresh = pairOf(cookieOf(first, 'tether_refresh'));
    const answers = await Promise.all(
      [1, 2, 3].map(() => app.visitor().post('/api/refresh').set('Cookie', refresh)),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 401, 401]);
  });

  it('ends after 20 idle minutes, and a renewal in the background is no sign of work', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    app.clock.advance(19 * MINUTE);
    await agent.post('/api/refresh').expect(200);
    app.clock.advance(MINUTE);
    const idle = await agent.get('/api/me');
    expect([idle.status, idle.body.code]).toEqual([401, 'session_ended']);
    expect(idle.body.params).toEqual({ why: '20 minutes without use' });
    await agent.post('/api/refresh').expect(401);
  });

  it('stays while a person works, and ends after 12 hours all the same', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    const end = app.clock.now.getTime() + 12 * 60 * MINUTE;
    while (app.clock.now.getTime() + 19 * MINUTE < end) {
      app.clock.advance(19 * MINUTE);
      await agent.post('/api/refresh').expect(200);
      await agent.get('/api/me').expect(200);
    }
    app.clock.advance(end - app.clock.now.getTime());
    const answer = await agent.post('/api/refresh');
    expect(answer.body.params).toEqual({ why: '12 hours' });
    await agent.get('/api/me').expect(401);
  });

  it('ends on the server at sign-out, though the token is still good', async () => {
    const first = await knock(app.visitor(), mira.email, PASSWORD);
    const access = pairOf(cookieOf(first, 'tether_access'));
    const out = await app.visitor().post('/api/sign-out').set('Cookie', access).expect(204);
    expect(cookieOf(out, 'tether_access')).toContain('Expires=Thu, 01 Jan 1970');
    const after = await app.visitor().get('/api/me').set('Cookie', access);
    expect(after.body).toMatchObject({ code: 'session_ended', params: { why: 'signed out' } });
  });

  it('is not made by a token of another key, kind, algorithm or form', async () => {
    const first = await knock(app.visitor(), mira.email, PASSWORD);
    const [session] = await app.database.query<{ uid: string }>(
      'SELECT uid FROM session WHERE account_id = $1',
      [mira.id],
    );
    const claims = { sid: session?.uid, exp: Math.floor(app.clock.now.getTime() / 1_000) + 60 };
    const key = app.deps.secrets.jwtKey;
    const forged = [
      jwt.sign(claims, 'another key', { audience: 'access' }),
      jwt.sign(claims, key, { audience: 'device' }),
      jwt.sign(claims, key, { audience: 'access', algorithm: 'HS512' }),
      jwt.sign(claims, null, { audience: 'access', algorithm: 'none' }),
      pairOf(cookieOf(first, 'tether_device')).split('=')[1] ?? '',
      'not.a.token',
    ];
    for (const token of forged) {
      await app.visitor().get('/api/me').set('Cookie', `tether_access=${token}`).expect(401);
    }
    const good = jwt.sign(claims, key, { audience: 'access' });
    await app.visitor().get('/api/me').set('Cookie', `tether_access=${good}`).expect(200);
    // The same token in a header opens nothing.
    await app.visitor().get('/api/me').set('Authorization', `Bearer ${good}`).expect(401);
  });

  it('is listed to its person and to nobody else, and can be ended from another', async () => {
    const here = await app.signedIn(mira.email, PASSWORD);
    const there = await app.signedIn(mira.email, PASSWORD);
    const other = await makePerson(app.database, `Other ${'z'.repeat(people)}`);
    const stranger = await app.signedIn(other.email, PASSWORD);
    const list = await here.get('/api/me/sessions').expect(200);
    expect(list.body.rows).toHaveLength(2);
    const elsewhere = list.body.rows.find((row: { current: boolean }) => !row.current);
    const foreign = await stranger.delete(`/api/me/sessions/${elsewhere.id}`);
    expect(foreign.status).toBe(404);
    await there.get('/api/me').expect(200);
    await here.delete(`/api/me/sessions/${elsewhere.id}`).expect(204);
    await there.get('/api/me').expect(401);
    await here.get('/api/me').expect(200);
  });
});

describe('the own password', () => {
  const change = (agent: TestAgent, newPassword: string) =>
    agent.post('/api/me/password').send({ currentPassword: PASSWORD, newPassword });

  it('is changed with the old one, and every other session ends', async () => {
    const here = await app.signedIn(mira.email, PASSWORD);
    const there = await app.signedIn(mira.email, PASSWORD);
    await change(here, 'harbour light 9 oak').expect(204);
    await here.get('/api/me').expect(200);
    await there.get('/api/me').expect(401);
    await knock(app.visitor(), mira.email, PASSWORD).expect(401);
    await knock(app.visitor(), mira.email, 'harbour light 9 oak').expect(200);
  });

  it('is at least 8 letters, not a common one, not the old one and not one’s own name', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    const said = async (password: string) => (await change(agent, password)).body.code;
    expect(await said('short 7')).toBe('invalid_request');
    expect(await said('password123')).toBe('password_common');
    expect(await said('Qwertyuiop')).toBe('password_common');
    expect(await said('abababababab')).toBe('password_common');
    expect(await said('Summer2026!')).toBe('password_common');
    expect(await said(PASSWORD)).toBe('password_same');
    expect(await said(`${mira.email.split('@')[0]}1`)).toBe('password_personal');
    await knock(app.visitor(), mira.email, PASSWORD).expect(200);
  });

  it('is the first thing to change where it is a temporary one', async () => {
    const fresh = await makePerson(app.database, `Fresh ${'w'.repeat(people)}`, {
      mustChangePassword: true,
    });
    const agent = app.visitor();
    const signed = await knock(agent, fresh.email, PASSWORD).expect(200);
    expect(signed.body.mustChangePassword).toBe(true);
    const refused = await agent.get('/api/me/sessions');
    expect([refused.status, refused.body.code]).toEqual([403, 'password_change_needed']);
    const me = await agent.get('/api/me').expect(200);
    expect(me.body.account.mustChangePassword).toBe(true);
    await change(agent, 'harbour light 9 oak').expect(204);
    await agent.get('/api/me/sessions').expect(200);
  });
});
