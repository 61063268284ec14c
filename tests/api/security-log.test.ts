import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { verifyChains } from '../../api/audit/verify.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';
import { makePerson, PASSWORD } from './people.ts';

let app: TestApp;
let admin: TestAgent;

beforeAll(async () => {
  app = await startTestApp();
  const adair = await makePerson(app.database, '=Adair', { administrator: true });
  const mira = await makePerson(app.database, 'Mira');
  admin = await app.signedIn(adair.email, PASSWORD);
  const wrong = app.visitor();
  await wrong.post('/api/sign-in').send({ email: mira.email, password: 'wrong' }).expect(401);
  await wrong
    .post('/api/sign-in')
    .send({ email: 'nobody@x.example', password: 'wrong' })
    .expect(401);
  app.clock.advance(24 * 3_600_000);
  const agent = await app.signedIn(mira.email, PASSWORD);
  await agent.post('/api/sign-out').expect(204);
  admin = await app.signedIn(adair.email, PASSWORD);
});
afterAll(() => app.close());

it('shows who, about whom, from which address without telling the address', async () => {
  const log = await admin.get('/api/security-log?direction=asc').expect(200);
  const seen = log.body.rows.map((row: Record<string, unknown>) => [row.action, row.by, row.about]);
  expect(seen).toEqual([
    ['sign-in accepted', '=Adair', '=Adair'],
    ['sign-in refused', null, 'Mira'],
    ['sign-in refused', null, null],
    ['sign-in accepted', 'Mira', 'Mira'],
    ['signed out', 'Mira', 'Mira'],
    ['sign-in accepted', '=Adair', '=Adair'],
  ]);
  expect(log.body.total).toBe(6);
  const addresses = new Set(log.body.rows.map((row: { address: string }) => row.address));
  addresses.delete(null);
  expect(addresses.size).toBe(1);
  expect(log.text).not.toContain('127.0.0.1');
  expect(log.text).not.toContain('nobody@x.example');
});

it('filters by action, person and day, and pages', async () => {
  const total = async (query: string) => (await admin.get(`/api/security-log?${query}`)).body.total;
  expect(await total('action=sign-in%20refused')).toBe(2);
  expect(await total('text=mira')).toBe(3);
  expect(await total('from=2026-12-02')).toBe(3);
  expect(await total('until=2026-12-01')).toBe(3);
  const page = await admin.get('/api/security-log?pageSize=2&page=2');
  expect(page.body.rows).toHaveLength(2);
  expect(page.body.rows[0].number).toBeGreaterThan(page.body.rows[1].number);
  expect((await admin.get('/api/security-log?action=made-up')).status).toBe(422);
});

it('is a file that no spreadsheet will calculate', async () => {
  const file = await admin.get('/api/security-log.csv?direction=asc').expect(200);
  expect(file.headers['content-disposition']).toContain('security-log-2026-12-02.csv');
  const lines = file.text.trimEnd().split('\r\n');
  expect(lines).toHaveLength(7);
  expect(lines[0]).toBe('number,at (UTC),action,by,about,address fingerprint,reason,hash');
  expect(lines[1]).toContain(",'=Adair,'=Adair,");
});

it('stands in a chain that verifies', async () => {
  const verified = await verifyChains(app.deps.databases.masked);
  expect(verified.broken).toEqual([]);
  expect(verified.entries).toBeGreaterThanOrEqual(6);
});
