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

describe('the door', () => {
  it('answers 401 to an anonymous caller everywhere under /api, known or unknown, before any look-up', async () => {
    const tries: [string, string][] = [
      ['get', '/api/me'],
      ['get', '/api/studies/not-an-id/members'],
      ['post', '/api/accounts'],
      ['get', '/api/nothing/here'],
      ['get', '/api'],
      ['get', '/API/me'],
      ['get', '/api/me/'],
      ['get', '/api//me'],
      ['delete', '/api/sign-in'],
    ];
    for (const [method, path] of tries) {
      const send = app.visitor()[method as 'get' | 'post' | 'delete'](path);
      const answer = await send.send(method === 'post' ? '{ broken' : undefined);
      expect([path, answer.status]).toEqual([path, 401]);
      expect(answer.body).toMatchObject({ code: 'not_signed_in', status: 401 });
      expect(answer.headers['content-type']).toContain('application/problem+json');
    }
  });

  it('opens health, the description and the sign-in to everybody', async () => {
    await app.visitor().get('/healthz').expect(200, { status: 'ok' });
    await app.visitor().get('/readyz').expect(200, { status: 'ok' });
    await app.visitor().get('/api/openapi.json').expect(200);
    await app.visitor().get('/api/docs').expect(200);
    await app.visitor().post('/api/sign-in').send({}).expect(422);
  });

  it('keeps every answer under /api out of caches and binds the browser', async () => {
    const answer = await app.visitor().get('/api/me');
    expect(answer.headers['cache-control']).toBe('no-store');
    expect(answer.headers['content-security-policy']).toContain("script-src 'self'");
    expect(answer.headers['content-security-policy']).not.toContain("script-src 'self' 'unsafe");
    expect(answer.headers['x-powered-by']).toBeUndefined();
    expect(answer.headers['x-request-id']).toBe(answer.body.requestId);
  });

  it('refuses a change that another site asks for, even with the cookie', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    const before = await agent.get('/api/me');
    const body = { theme: 'dark', version: before.body.account.version };
    const others: Record<string, string>[] = [
      { Origin: 'https://elsewhere.example' },
      { Origin: 'null' },
    ];
    for (const headers of others) {
      const answer = await agent.patch('/api/me').set(headers).send(body);
      expect([answer.status, answer.body.code]).toEqual([403, 'origin_refused']);
    }
    const after = await agent.get('/api/me');
    expect(after.body.account.theme).toBe('system');
    await agent.patch('/api/me').send(body).expect(200);
  });

  it('names what is wrong with a body and keeps nothing of it', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    const broken = await agent
      .patch('/api/me')
      .set('content-type', 'application/json')
      .send('{"theme":');
    expect([broken.status, broken.body.code]).toEqual([400, 'malformed_json']);
    const form = await agent.patch('/api/me').type('form').send({ theme: 'dark' });
    expect([form.status, form.body.code]).toEqual([415, 'json_expected']);
    const wrong = await agent.patch('/api/me').send({ theme: 'pink', timeZone: 'Moon/Base' });
    expect([wrong.status, wrong.body.code]).toEqual([422, 'invalid_request']);
    expect(wrong.body.errors).toEqual([
      { path: 'theme', message: 'Choose one of: system, light, dark.' },
      { path: 'timeZone', message: 'Choose a time zone of the list.' },
      { path: 'version', message: 'Fill this in.' },
    ]);
    const nul = await agent.patch('/api/me').send({ timeZone: 'UTC\u0000', version: 1 });
    expect([nul.status, nul.body.errors[0].path]).toEqual([422, 'timeZone']);
    const large = await agent.patch('/api/me').send({ theme: 'x'.repeat(2_000_000) });
    expect([large.status, large.body.code]).toEqual([413, 'body_too_large']);
  });
});

describe('signing in', () => {
  it('gives cookies that no script can read and no other site can send', async () => {
    const answer = await knock(app.visitor(), mira.email.toUpperCase(), PASSWORD).expect(200);
    for (const [name, path] of [
      ['tether_access', '/'],
      ['tether_refresh', '/api/refresh'],
      ['tether_device', '/api/sign-in'],
    ] as const) {
      const cookie = cookieOf(answer, name);
      expect(cookie).toContain('HttpOnly');
      expect(cookie).toContain('SameSite=Strict');
      expect(cookie).toContain(`Path=${path};`);
      expect(cookie).not.toContain('Secure');
    }
    expect(answer.body).toEqual({
      accessExpiresAt: new Date(app.clock.now.getTime() + 5 * MINUTE).toISOString(),
      absoluteExpiresAt: new Date(app.clock.now.getTime() + 12 * 60 * MINUTE).toISOString(),
      idleMinutes: 20,
      mustChangePassword: false,
    });
    expect(JSON.stringify(answer.body)).not.toContain('tether');
    const agent = await app.signedIn(mira.email, PASSWORD);
    const ends = app.clock.now.getTime() + 5 * MINUTE;
    app.clock.advance(MINUTE);
    const me = await agent.get('/api/me').expect(200);
    expect(me.body.session.accessExpiresAt).toBe(new Date(ends).toISOString());
  });

  it('answers an unknown address, a wrong password and a closed account in the same words', async () => {
    const closed = await makePerson(app.database, `Closed ${'y'.repeat(people)}`);
    await app.database.query('UPDATE account SET disabled_at = $1 WHERE id = $2', [
      app.clock.now,
      closed.id,
    ]);
    const answers = [
      await knock(app.visitor(), 'nobody@nowhere.example', PASSWORD),
      await knock(app.visitor(), mira.email, 'not the password'),
      await knock(app.visitor(), closed.email, PASSWORD),
    ];
    const said = answers.map(({ status, body }) => ({ ...body, status, requestId: '' }));
    expect(said[0]).toMatchObject({ status: 401, code: 'sign_in_refused', params: {} });
    expect(said[1]).toEqual(said[0]);
    expect(said[2]).toEqual(said[0]);
  });

  it('does the same work for an address without an account', async () => {
    const time = async (email: string) => {
      const start = performance.now();
      await knock(app.visitor(), email, 'not the password').expect(401);
      return performance.now() - start;
    };
    await time('warm@nowhere.example');
    const median = async (email: string) => {
      const times: number[] = [];
      for (let n = 0; n < 5; n += 1) times.push(await time(email));
      return times.sort((a, b) => a - b)[2] ?? 0;
    };
    const known = await median(mira.email);
    const unknown = await median('nobody@nowhere.example');
    // Hashing takes the most of it; without it the unknown one would take a tenth.
    expect(unknown).toBeGreaterThan(known * 0.4);
    expect(unknown).toBeLessThan(known * 2.5);
  });

  it('writes what happened into the trail, without a password or an address nobody has', async () => {
    await knock(app.visitor(), mira.email, 'hunter-secret-77');
    await knock(app.visitor(), 'my-password-by-mistake@x.example', 'hunter-secret-77');
    await knock(app.visitor(), mira.email, PASSWORD);
    const refused = (await entries('sign-in refused')).slice(-2);
    expect(refused.map((entry) => entry.entity_uid)).toEqual([mira.uid, null]);
    const accepted = (await entries('sign-in accepted')).at(-1);
    expect(accepted).toMatchObject({ actor_name: mira.name, entity_uid: mira.uid });
    const all = await app.database.query<{ body: string }>('SELECT body FROM audit.entry');
    const text = all.map(({ body }) => body).join('\n');
    expect(text).not.toContain('hunter-secret-77');
    expect(text).not.toContain('my-password-by-mistake');
    expect(text).not.toContain(PASSWORD);
  });

  it('keeps passwords as argon2id and tokens as hashes', async () => {
    const answer = await knock(app.visitor(), mira.email, PASSWORD);
    const refresh = pairOf(cookieOf(answer, 'tether_refresh')).split('=')[1] ?? '';
    const [account] = await app.database.query<{ password_hash: string }>(
      'SELECT password_hash FROM account WHERE id = $1',
      [mira.id],
    );
    expect(account?.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    const tokens = await app.database.query<{ token_hash: string }>(
      'SELECT token_hash FROM refresh_token',
    );
    expect(tokens.map((row) => row.token_hash)).not.toContain(refresh);
  });
});

describe('many wrong tries', () => {
  const wrong = (agent: TestAgent, email: string) => knock(agent, email, 'not the password');

  it('are held back after 20, known address or not, and let in again in the next window', async () => {
    for (const email of [mira.email, 'nobody@nowhere.example']) {
      const agent = app.visitor();
      for (let n = 0; n < 20; n += 1) expect((await wrong(agent, email)).status).toBe(401);
      const held = await wrong(agent, email);
      expect(held.status).toBe(429);
      expect(held.body).toMatchObject({ code: 'sign_in_throttled', params: { minutes: 15 } });
      expect(Number(held.headers['retry-after'])).toBe(900);
      // Not even the right password tells itself apart now.
      expect((await knock(agent, email, PASSWORD)).status).toBe(429);
    }
    app.clock.advance(15 * MINUTE);
    await knock(app.visitor(), mira.email, PASSWORD).expect(200);
    expect(await entries('sign-in throttled')).toHaveLength(2);
  });

  it('do not lock out the person who signed in from this browser before', async () => {
    const own = app.visitor();
    await knock(own, mira.email, PASSWORD).expect(200);
    const stranger = app.visitor();
    for (let n = 0; n < 21; n += 1) await wrong(stranger, mira.email);
    expect((await knock(stranger, mira.email, PASSWORD)).status).toBe(429);
    await knock(own, mira.email, PASSWORD).expect(200);
    // The mark opens nothing for another account, and has a limit of its own.
    for (let n = 0; n < 20; n += 1) expect((await wrong(own, mira.email)).status).toBe(401);
    expect((await wrong(own, mira.email)).status).toBe(429);
  });

  it('sent all at once can not slip past together', async () => {
    const agent = app.visitor();
    const answers = await Promise.all(Array.from({ length: 40 }, () => wrong(agent, mira.email)));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(20);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(20);
  });

  it('of the password asked again are held back too', async () => {
    const agent = await app.signedIn(mira.email, PASSWORD);
    const again = (currentPassword: string) =>
      agent.post('/api/me/password').send({ currentPassword, newPassword: 'harbour light 9 oak' });
    for (let n = 0; n < 20; n += 1) expect((await again('wrong')).body.code).toBe('password_wrong');
    const held = await again(PASSWORD);
    expect([held.status, held.body.code]).toEqual([429, 'password_tries_spent']);
    await knock(app.visitor(), mira.email, PASSWORD).expect(200);
  });
});

describe('over TLS', () => {
  it('cookies are Secure and the browser is told to stay with TLS', async () => {
    const secure = await startTestApp({ env: { PUBLIC_URL: 'https://study.example' } });
    try {
      const person = await makePerson(secure.database, 'Tess Lane');
      const answer = await knock(secure.visitor(), person.email, PASSWORD).expect(200);
      expect(cookieOf(answer, 'tether_access')).toContain('Secure');
      expect(cookieOf(answer, 'tether_refresh')).toContain('Secure');
      expect(answer.headers['strict-transport-security']).toContain('max-age=31536000');
    } finally {
      await secure.close();
    }
  });
});
