/** Each route × each person, allowed and refused: status and stored state together. */
import { setTimeout as wait } from 'node:timers/promises';
import type { Response } from 'supertest';
import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { featureRoutes } from '../../api/features/index.ts';
import { describeApi } from '../../api/http/openapi.ts';
import { frozenCut } from './matrix/analysis-ground.ts';
import { matrix } from './matrix/index.ts';
import { type MatrixRequest, type MatrixRow, mayCall, refusalOf, statusFor } from './matrix/row.ts';
import { everybody, type Who } from './matrix/who.ts';
import { ARMS, makeWorld, type World } from './matrix/world.ts';

let world: World;
/** Names of the arms and, as text of JSON, the codes of the key: what a masked study keeps from everyone here. */
let secrets: string[];
beforeAll(async () => {
  world = await makeWorld();
  await frozenCut(world);
  const keys = await world.query<{ code: string }>('SELECT code FROM sealed.code_key');
  expect(keys).toHaveLength(ARMS.length);
  secrets = [...ARMS, ...keys.map(({ code }) => `"${code}"`)];
});
afterAll(() => world.close());

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';
const methodOf = (row: MatrixRow) => row.route.split(' ')[0]?.toLowerCase() as Method;

async function send(agent: TestAgent, method: Method, request: MatrixRequest): Promise<Response> {
  const answer = await sent(agent, method, request);
  // Arm names stand in the protocol, so the set-up shows them; beside a subject or a count they stand nowhere.
  if (!request.path.endsWith('/setup')) {
    const told = secrets.filter((secret) => answer.text?.includes(secret));
    expect({ path: request.path, told }).toEqual({ path: request.path, told: [] });
  }
  return answer;
}

async function sent(agent: TestAgent, method: Method, request: MatrixRequest): Promise<Response> {
  const call = agent[method](request.path).set(request.headers ?? {});
  if (request.upload) {
    for (const [name, value] of Object.entries(request.upload.fields)) call.field(name, value);
    return call.attach('file', Buffer.from(request.upload.content), request.upload.name);
  }
  return request.body ? call.send(request.body) : call;
}

const storedBy = (row: MatrixRow): Promise<unknown> =>
  row.stored ? row.stored(world) : Promise.resolve(null);

/** Counts every entry of the trail: a refused act leaves none but that of the door itself. */
async function auditedInStudies(): Promise<number> {
  const [row] = await world.query<{ count: string }>(
    `SELECT count(*) FROM audit.entry WHERE chain <> 'installation'`,
  );
  return Number(row?.count);
}

/** Work that an earlier line started writes entries of its own, so it has to end first. */
async function workEnded(): Promise<void> {
  for (let tries = 0; tries < 200; tries += 1) {
    const [row] = await world.query<{ count: string }>(
      `SELECT count(*) FROM job WHERE kind LIKE 'import-%' AND state IN ('waiting', 'running')`,
    );
    if (row?.count === '0') return;
    await wait(50);
  }
  throw new Error('work in the queue did not end');
}

const described = describeApi(featureRoutes).paths ?? {};
const operations = Object.entries(described).flatMap(([path, methods]) =>
  Object.entries(methods as Record<string, { 'x-roles': string[] }>).map(
    ([method, operation]) =>
      [`${method.toUpperCase()} ${path}`, [...operation['x-roles']].sort()] as const,
  ),
);

describe('the table', () => {
  it('has one line for every route of the description, with the same roles', () => {
    const lines = matrix.map((row) => [row.route, [...row.may].sort()] as const);
    const byRoute = (a: readonly [string, string[]], b: readonly [string, string[]]) =>
      a[0] < b[0] ? -1 : 1;
    expect([...lines].sort(byRoute)).toEqual([...operations].sort(byRoute));
  });

  it('reads again what every change changes', () => {
    const silent = matrix.filter(
      (row) => methodOf(row) !== 'get' && !row.stored && !row.may.includes('public'),
    );
    expect(silent.map((row) => row.route)).toEqual([]);
  });
});

describe.each(matrix.map((row) => [row.route, row] as const))('%s', (_route, row) => {
  it('is refused to everybody else, and nothing is stored', async () => {
    const request = await row.prepare(world, null);
    await workEnded();
    const before = await storedBy(row);
    const audited = await auditedInStudies();
    for (const who of everybody.filter((one) => !mayCall(row, one))) {
      const answer = await send(await world.agent(who), methodOf(row), request);
      expect({ who, status: answer.status, code: answer.body.code }).toEqual({
        who,
        ...refusalOf(row, who),
      });
    }
    if (row.own) {
      // It belongs to one person; for another it does not exist.
      const answer = await send(await world.agent('stranger'), methodOf(row), request);
      expect([answer.status, answer.body.code]).toEqual([404, 'not_found']);
    }
    await refuseThroughOtherStudy(row, request);
    expect(await storedBy(row)).toEqual(before);
    expect(await auditedInStudies()).toBe(audited);
  });

  it.each(everybody.filter((who) => mayCall(row, who)))('is open to %s', async (who: Who) => {
    const request = await row.prepare(world, who);
    const before = await storedBy(row);
    const answer = await send(await world.agent(who), methodOf(row), request);
    expect({ status: answer.status, problem: answer.status >= 400 ? answer.body : null }).toEqual({
      status: statusFor(row, who),
      problem: statusFor(row, who) >= 400 ? expect.anything() : null,
    });
    if (row.stored && answer.status < 400) expect(await storedBy(row)).not.toEqual(before);
  });
});

/** An id of this study under the address of another one, by somebody who may do the same there. */
async function refuseThroughOtherStudy(row: MatrixRow, request: MatrixRequest): Promise<void> {
  const rest = row.route.split('{study}')[1] ?? '';
  if (!rest.includes('{')) return;
  const path = request.path.replace(world.study.uid, world.otherStudy.uid);
  const answer = await send(await world.agent('stranger'), methodOf(row), { ...request, path });
  expect({ path, status: answer.status }).toEqual({ path, status: 404 });
}

describe('after all of it', () => {
  it('nothing kept of the requests tells who is in which arm', async () => {
    const kept = await world.query<{ place: string; text: string }>(
      `SELECT 'trail' AS place, body AS text FROM audit.entry WHERE action <> 'study set up'
       UNION ALL SELECT 'replay', coalesce(body, '') FROM idempotency
       UNION ALL SELECT 'job', to_jsonb(job)::text FROM job
       UNION ALL SELECT 'import', to_jsonb(import)::text FROM import
       UNION ALL SELECT 'cut', convert_from(bytes, 'UTF8') FROM cut_chunk
       UNION ALL SELECT 'record', to_jsonb(analysis_record)::text FROM analysis_record
       UNION ALL SELECT 'letter', to_jsonb(letter)::text FROM letter`,
    );
    const places = new Set(kept.map(({ place }) => place));
    for (const place of ['trail', 'job', 'import', 'cut', 'record'])
      expect(places).toContain(place);
    expect(kept.filter(({ text }) => secrets.some((secret) => text.includes(secret)))).toEqual([]);
  });
});
