import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson } from '../../api/analysis-threads/canonical-json.ts';
import type { TestDatabase } from '../support/test-database.ts';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { PASSWORD, type StudyForTests } from './analysis-study.ts';

let database: TestDatabase;
let study: StudyForTests;
let app: AnalystApp;
let cut: string;
let record: string;
let contentSha256: string;

const specification = {
  measure: 'reaction',
  axis: 'since_baseline',
  unit: 'days',
  group: false,
} as const;
const runs = { specification, fit: 'pooled', purpose: 'planned' } as const;

beforeAll(async () => {
  app = await openAnalysis({ masked: true });
  ({ database, study } = app);
  const frozen = await app.post('analyst', '/cuts', {
    name: 'First',
    visitCutoff: '2026-11-30',
    measures: ['reaction', 'lapses'],
    exclusions: [],
    includeWithdrawnReason: null,
  });
  cut = frozen.body.id;
  await app.post('analyst', `/cuts/${cut}/check`, { specification });
});
afterAll(async () => {
  await app.close();
});

async function stored() {
  const [row] = await database.query(
    `SELECT (SELECT count(*) FROM analysis_record)::int AS records,
            (SELECT count(*) FROM signature)::int AS signatures`,
  );
  return row;
}

describe('a record', () => {
  it('is written by each run, with purpose, numbers and picture', async () => {
    const unasked = await app.post('analyst', `/cuts/${cut}/fits`, { ...runs, purpose: undefined });
    expect(unasked.status).toBe(422);
    expect(await stored()).toEqual({ records: 0, signatures: 0 });
    const answer = await app.post('analyst', `/cuts/${cut}/fits`, runs, 'pooled-0001');
    const replay = await app.post('analyst', `/cuts/${cut}/fits`, runs, 'pooled-0001');
    expect([answer.status, replay.status]).toEqual([201, 201]);
    expect(replay.body.id).toBe(answer.body.id);
    expect(await stored()).toEqual({ records: 1, signatures: 0 });
    const { headline, result, picture } = answer.body;
    expect(headline.estimate).toBeCloseTo(10.467286, 6);
    expect(result.pooled.coefficients.time.se_cr2).toBeCloseTo(1.54579, 5);
    expect(result.pooled.coefficients.time.df).toBeCloseTo(17, 6);
    expect(result.input.sha256).toBe(answer.body.cutSha256);
    expect(picture.subjects).toHaveLength(18);
    expect(picture.visits.map((visit: { n: number }) => visit.n)).toEqual(new Array(10).fill(18));
    expect(picture.band[0].points).toHaveLength(49);
    expect(picture.band[0].points[0].df).toBeCloseTo(17, 6);
    expect(answer.body.mayBeSignedByMe).toBe(true);
    record = answer.body.id;
    contentSha256 = answer.body.contentSha256;
  });

  it('stores 10.467286 and 1.545790, as the database itself reads them', async () => {
    const [row] = await database.query<{ slope: number; error: number }>(
      `SELECT (result_text::jsonb #>> '{pooled,coefficients,time,estimate}')::float8 AS slope,
              (result_text::jsonb #>> '{pooled,coefficients,time,se_cr2}')::float8 AS error
         FROM analysis_record`,
    );
    expect(row?.slope).toBeCloseTo(10.467286, 6);
    expect(row?.error).toBeCloseTo(1.54579, 5);
  });

  it('gives the same bytes when the same is run again', async () => {
    await app.post('analyst', `/cuts/${cut}/fits`, runs);
    const texts = await database.query<{ result_text: string; check_text: string }>(
      'SELECT result_text, check_text FROM analysis_record ORDER BY id',
    );
    expect(texts).toHaveLength(2);
    expect(texts[0]).toEqual(texts[1]);
  });

  it('is repeated byte by byte by the command, from the downloaded cut', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'tetherline-cut-'));
    try {
      const path = join(folder, 'cut.csv');
      writeFileSync(path, (await app.get('analyst', `/cuts/${cut}/file`)).text);
      const columns = ['--subject', 'subject', '--time', 'day', '--response', 'reaction'];
      const { stdout } = await promisify(execFile)(
        process.execPath,
        ['--import', 'tsx', 'api/cli/analyse.ts', path, ...columns],
        { cwd: fileURLToPath(new URL('../..', import.meta.url)) },
      );
      const [row] = await database.query<{ result_text: string }>(
        'SELECT result_text FROM analysis_record ORDER BY id LIMIT 1',
      );
      expect(canonicalJson(JSON.parse(stdout))).toBe(row?.result_text);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });

  it('is a file whose content anybody can hash again', async () => {
    const answer = await app.get('owner', `/records/${record}/file`);
    expect(answer.status).toBe(200);
    expect(answer.headers['content-disposition']).toContain('record-cut-1-reaction-1.json');
    const file = JSON.parse(answer.text);
    expect(file.format).toBe('tetherline-record/1');
    const text = canonicalJson(file.content);
    expect(createHash('sha256').update(text).digest('hex')).toBe(contentSha256);
    expect(file.content_sha256).toBe(contentSha256);
    expect(file.content).toMatchObject({ seed: 1, engine: '0.1.0', purpose: 'planned' });
  });

  it('leaves a trace when its file leaves the house', async () => {
    const [entry] = await database.query(
      `SELECT role_then, entity_uid, after FROM audit.entry WHERE action = 'record downloaded'
        ORDER BY seq DESC LIMIT 1`,
    );
    expect(entry).toEqual({ role_then: 'owner', entity_uid: record, after: { contentSha256 } });
  });

  it('is listed, filtered and sorted', async () => {
    await app.post('second', `/cuts/${cut}/check`, {
      specification: { ...specification, measure: 'lapses' },
    });
    await app.post('second', `/cuts/${cut}/fits`, {
      ...runs,
      specification: { ...specification, measure: 'lapses' },
      purpose: 'exploratory',
    });
    const list = async (query: string) => (await app.get('owner', `/records?${query}`)).body;
    expect((await list('')).total).toBe(3);
    expect((await list('measure=lapses')).rows[0]).toMatchObject({
      purpose: 'exploratory',
      by: 'Robin second',
      measure: { label: 'Lapses' },
      signed: false,
    });
    expect((await list(`cut=${cut}&purpose=planned`)).total).toBe(2);
    expect((await list('signed=yes')).total).toBe(0);
    expect((await list('sort=by&direction=desc&pageSize=1')).rows[0].by).toBe('Robin second');
    expect((await list('fit=ordinary')).total).toBe(0);
  });

  it('can be changed by nobody at the database', async () => {
    const { masked } = await database.databases();
    const change = `UPDATE analysis_record SET result_text = '{}'`;
    await expect(masked.query(change)).rejects.toThrow();
    await expect(database.query(change)).rejects.toThrow();
  });
});

describe('a signature', () => {
  const sign = (change: object = {}) => ({
    password: PASSWORD,
    meaning: 'I ran this analysis',
    contentSha256,
    ...change,
  });
  const path = () => `/records/${record}/signatures`;

  it('is refused with a wrong password, another content or for what one did not run', async () => {
    const wrong = await app.post('analyst', path(), sign({ password: 'not the password' }));
    expect([wrong.status, wrong.body.code]).toEqual([403, 'password_wrong']);
    const other = await app.post('analyst', path(), sign({ contentSha256: '0'.repeat(64) }));
    expect([other.status, other.body.code]).toEqual([409, 'record_content_differs']);
    const notMine = await app.post('second', path(), sign());
    expect([notMine.status, notMine.body.code]).toEqual([422, 'record_not_run_by_you']);
    expect((await app.post('owner', path(), sign())).status).toBe(403);
    expect((await stored())?.signatures).toBe(0);
  });

  it('keeps name, time, zone, meaning and hash, once', async () => {
    const answer = await app.post('analyst', path(), sign());
    expect(answer.status).toBe(201);
    expect(answer.body.signatures).toEqual([
      {
        name: 'Robin analyst',
        at: '2026-12-01T12:00:00.000Z',
        zone: 'Europe/Zurich',
        meaning: 'I ran this analysis',
        contentSha256,
        valid: true,
      },
    ]);
    const twice = await app.post('analyst', path(), sign());
    expect([twice.status, twice.body.code]).toEqual([409, 'record_signed_already']);
    const review = await app.post('second', path(), sign({ meaning: 'I reviewed this analysis' }));
    expect(review.body.signatures).toHaveLength(2);
    expect(review.body.mayBeSignedByMe).toBe(false);
    expect((await app.get('owner', '/records?signed=yes')).body.total).toBe(1);
  });

  it('keeps the name as it was when the account is renamed', async () => {
    await database.query(`UPDATE account SET name = 'Robin Newname' WHERE id = $1`, [
      study.actor('analyst').accountId,
    ]);
    const answer = await app.get('owner', `/records/${record}`);
    expect(answer.body.by).toBe('Robin Newname');
    expect(answer.body.signatures[0]).toMatchObject({ name: 'Robin analyst', valid: true });
  });

  it('says so when the content was changed behind the back of the application', async () => {
    await database.query('ALTER TABLE analysis_record DISABLE TRIGGER USER');
    await database.query(
      `UPDATE analysis_record SET result_text = replace(result_text, '"seed":1', '"seed":2')
        WHERE uid = $1`,
      [record],
    );
    await database.query('ALTER TABLE analysis_record ENABLE TRIGGER USER');
    const answer = await app.get('owner', `/records/${record}`);
    expect(answer.body.signatures.map((one: { valid: boolean }) => one.valid)).toEqual([
      false,
      false,
    ]);
    const again = await app.post('second', path(), sign({ meaning: 'I reviewed this analysis' }));
    expect(again.body.code).toBe('record_content_differs');
  });

  it('stops guessing of the password', async () => {
    const statuses: number[] = [];
    for (let tries = 0; tries < 25; tries++) {
      statuses.push(
        (await app.post('second', path(), sign({ password: `guess ${tries}` }))).status,
      );
    }
    expect(statuses.at(-1)).toBe(429);
    expect((await stored())?.signatures).toBe(2);
  });
});

describe('records of another study', () => {
  it('are answered as unknown ones', async () => {
    const unknown = '01a23288-1d84-7281-82d9-ffcae3e6886f';
    const answer = await app.get('analyst', `/records/${unknown}`);
    expect([answer.status, answer.body.code]).toEqual([404, 'not_found']);
    expect((await app.get('analyst', `/cuts/${unknown}/file`)).status).toBe(404);
    expect((await app.post('analyst', `/cuts/${unknown}/check`, { specification })).status).toBe(
      404,
    );
  });
});
