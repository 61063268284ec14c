import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../support/test-app.ts';

describe('the application as a whole', () => {
  let running: TestApp;
  beforeAll(async () => {
    running = await startTestApp({ work: true });
  });
  afterAll(() => running.close());

  it('is alive, and ready once database and storage answer', async () => {
    const visitor = running.visitor();
    await visitor.get('/healthz').expect(200, { status: 'ok' });
    await visitor.get('/readyz').expect(200, { status: 'ok' });
  });

  it('asks for a session before it says what exists', async () => {
    const visitor = running.visitor();
    const known = await visitor.get('/api/me').expect(401);
    const unknown = await visitor.get('/api/no-such-thing').expect(401);
    expect(unknown.body.code).toBe(known.body.code);
  });

  it('closes with work under way and leaves no connection that keeps the process alive', async () => {
    const second = await startTestApp({ work: true, listen: true });
    expect((await fetch(`${second.address}/healthz`)).status).toBe(200);
    await second.close();
    await expect(fetch(`${second.address}/healthz`)).rejects.toThrow();
  });
});
