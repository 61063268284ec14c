import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { BASELINE } from './analysis-study.ts';

let app: AnalystApp;

const SUBJECTS = 5_000;
const VISITS = 10;

/** 50,000 readings by one statement: entering them one by one is not what is looked at here. */
async function fill(): Promise<void> {
  const { studyId } = app.study;
  const { accountId } = app.study.actor('coordinator');
  const { query } = app.database;
  await query(
    `INSERT INTO subject (study_id, site_id, code, consent_version, consent_date, enrolment_date,
                          baseline_date, state, created_at, created_by)
     SELECT $1, (SELECT id FROM site WHERE study_id = $1), 'S' || lpad(n::text, 5, '0'), '1',
            '2026-10-30', '2026-10-31', $2::date, 'enrolled', '2026-11-01', $3
       FROM generate_series(1, ${SUBJECTS}) n`,
    [studyId, BASELINE, accountId],
  );
  await query(
    `INSERT INTO visit (study_id, subject_id, planned_visit_id, date, contact_mode, created_at, created_by)
     SELECT $1, s.id, p.id, $2::date + p.target_day, 'in person', '2026-11-11', $3
       FROM subject s JOIN planned_visit p ON p.study_id = s.study_id
      WHERE s.study_id = $1 ORDER BY s.id, p.target_day`,
    [studyId, BASELINE, accountId],
  );
  await query(
    `INSERT INTO reading (study_id, subject_id, visit_id, measure_id, value, entered_at, entered_by)
     SELECT $1, v.subject_id, v.id, m.id, 200 + (v.id * 7919 % 1000) / 8.0, '2026-11-11', $2
       FROM visit v JOIN measure m ON m.study_id = v.study_id AND m.short_name = 'reaction'
      WHERE v.study_id = $1`,
    [studyId, accountId],
  );
  await query('ANALYZE subject, visit, reading');
}

beforeAll(async () => {
  app = await openAnalysis({ masked: true, load: () => Promise.resolve() });
  await fill();
});
afterAll(() => app.close());

describe('a cut of 50,000 readings', () => {
  it('is frozen in seconds and served as the bytes that were hashed', async () => {
    const started = performance.now();
    const frozen = await app.post('analyst', '/cuts', {
      name: 'Large',
      visitCutoff: '2026-11-30',
      measures: ['reaction'],
      exclusions: [],
      includeWithdrawnReason: null,
    });
    const seconds = (performance.now() - started) / 1000;
    expect(frozen.status, frozen.text).toBe(201);
    expect(frozen.body).toMatchObject({ rows: SUBJECTS * VISITS, subjects: SUBJECTS, late: 0 });
    const [stored] = await app.database.query<{ chunks: number; bytes: number }>(
      'SELECT count(*)::int AS chunks, sum(length(bytes))::int AS bytes FROM cut_chunk',
    );
    // In pieces, so that a download holds one of them at a time.
    expect(stored?.chunks).toBeGreaterThan(5);
    const { text } = await app.get('analyst', `/cuts/${frozen.body.id}/file`);
    expect(text).toHaveLength(stored?.bytes ?? 0);
    expect(createHash('sha256').update(text).digest('hex')).toBe(frozen.body.sha256);
    // A second or two on an idle machine; a query that is not by sets takes minutes.
    expect(seconds).toBeLessThan(60);
  }, 120_000);
});
