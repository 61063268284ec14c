/** The demo goes through the services, so it obeys every rule; here it is read again as people would. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyChains } from '../../api/audit/verify.ts';
import { meSchema } from '../../api/contracts/auth.ts';
import { loadDemo } from '../../seeds-demo/load.ts';
import { demoPeople } from '../../seeds-demo/people.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

const NOW = new Date('2026-12-01T12:00:00Z');
let app: TestApp;

beforeAll(async () => {
  app = await startTestApp({ now: NOW });
  await loadDemo(app.deps, NOW);
}, 240_000);
afterAll(() => app.close());

describe('the demo', () => {
  it('has one account for each role, and each can sign in', async () => {
    expect(demoPeople.map(({ role }) => role)).toEqual([
      'owner',
      'coordinator',
      'monitor',
      'analyst',
      'unblinded statistician',
      'board member',
      'safety officer',
      'administrator',
    ]);
    for (const person of demoPeople) {
      const agent = await app.signedIn(person.email, person.password);
      const me = meSchema.parse((await agent.get('/api/me').expect(200)).body);
      expect(me.account.administrator).toBe(person.role === 'administrator');
      expect(me.account.mustChangePassword).toBe(false);
      if (person.role !== 'administrator') {
        expect(me.memberships.flatMap(({ roles }) => roles)).toContain(person.role);
      }
    }
  });

  it('is alive on the day of seeding', async () => {
    const [row] = await app.database.query(
      `SELECT (SELECT count(*)::int FROM subject x JOIN study s ON s.id = x.study_id AND s.short_name = 'harrow-fen') AS subjects,
              (SELECT count(DISTINCT state)::int FROM subject) AS states,
              (SELECT count(*) > 900 FROM visit) AS visits,
              (SELECT count(*) > 20 FROM visit WHERE missed_reason IS NOT NULL) AS missed,
              (SELECT count(*) > 3 FROM reading_revision) AS corrected,
              (SELECT count(*) > 5 FROM reading WHERE limit_sign = '>') AS censored,
              (SELECT count(*)::int FROM cut) AS cuts,
              (SELECT count(*)::int FROM analysis_record) AS records,
              (SELECT count(*)::int FROM signature) AS signatures,
              (SELECT state FROM import) AS import,
              (SELECT count(*)::int FROM import_refusal) AS refused,
              (SELECT max(created_at) <= '2026-12-01' FROM visit) AS "notInTheFuture"`,
    );
    expect(row).toEqual({
      subjects: 161,
      states: 6,
      visits: true,
      missed: true,
      corrected: true,
      censored: true,
      cuts: 3,
      records: 3,
      signatures: 1,
      import: 'applied',
      refused: 2,
      notInTheFuture: true,
    });
  });

  it('keeps the allocation sealed and the audit chains whole', async () => {
    const [sealed] = await app.database.query(
      `SELECT (SELECT count(*) > 80 FROM sealed.allocation) AS allocated,
              (SELECT count(*)::int FROM open_arm o JOIN study s ON s.id = o.study_id WHERE s.masked) AS open`,
    );
    expect(sealed).toEqual({ allocated: true, open: 0 });
    const verified = await verifyChains(app.deps.databases.masked);
    expect(verified.broken).toEqual([]);
    expect(verified.entries).toBeGreaterThan(1_200);
  });

  it('leaves the reaction study empty, to be imported into', async () => {
    const rows = await app.database.query(
      `SELECT 1 FROM subject x JOIN study s ON s.id = x.study_id WHERE s.short_name = 'reaction'`,
    );
    expect(rows).toEqual([]);
  });
});
