import { randomBytes } from 'node:crypto';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { prepareDatabase } from '../../api/prepare-database.ts';
import { startThrowAwayCluster } from '../../database/server/throw-away-cluster.ts';
import type { TestCluster } from './test-cluster.ts';

/** Projects of one run share a cluster: the set-up runs once for each of them, in the same process. */
const SHARED = Symbol.for('tetherline tests: cluster');

interface Shared {
  users: number;
  cluster: Promise<{ provided: TestCluster; stop(): Promise<void> }>;
}

const memory = globalThis as { [SHARED]?: Shared };

/** Starts the cluster of this run and makes the database that every test file gets a copy of. */
export async function setup(project: TestProject): Promise<void> {
  const shared = memory[SHARED] ?? { users: 0, cluster: startTestCluster() };
  memory[SHARED] = shared;
  shared.users += 1;
  project.provide('cluster', (await shared.cluster).provided);
}

export async function teardown(): Promise<void> {
  const shared = memory[SHARED];
  if (!shared) return;
  shared.users -= 1;
  if (shared.users > 0) return;
  memory[SHARED] = undefined;
  await (await shared.cluster).stop();
}

async function startTestCluster(): Promise<{ provided: TestCluster; stop(): Promise<void> }> {
  // Never DATABASE_URL: that one holds real studies.
  const given = process.env.TEST_DATABASE_URL;
  const own = given ? undefined : await startThrowAwayCluster(process.env);
  const adminUrl = given ?? own?.urlFor('postgres') ?? '';
  const run = `tetherline_test_${process.pid}_${randomBytes(3).toString('hex')}`;
  const provided: TestCluster = {
    adminUrl,
    template: `${run}_template`,
    databasePrefix: `${run}_`,
    rolePrefix: own ? 'tetherline' : run,
    passwords: { masked: secret(), board: secret(), open: secret() },
  };
  const stop = async () => {
    if (own) await own.stop();
    else await cleanServer(provided);
  };
  try {
    await withClient(adminUrl, (client) => client.query(`CREATE DATABASE ${provided.template}`));
    const url = new URL(adminUrl);
    url.pathname = `/${provided.template}`;
    await prepareDatabase(url.toString(), provided);
    return { provided, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

function secret(): string {
  return randomBytes(18).toString('base64url');
}

/** On a server that isn't ours, everything this run made goes again; what still has connections waits for them. */
async function cleanServer(provided: TestCluster): Promise<void> {
  await withClient(provided.adminUrl, async (client) => {
    const made = await client.query<{ datname: string }>(
      'SELECT datname FROM pg_database WHERE starts_with(datname, $1)',
      [provided.databasePrefix],
    );
    for (const { datname } of made.rows) await client.query(`DROP DATABASE ${datname}`);
    const roles = await client.query<{ rolname: string }>(
      'SELECT rolname FROM pg_roles WHERE starts_with(rolname, $1)',
      [`${provided.rolePrefix}_`],
    );
    for (const { rolname } of roles.rows) await client.query(`DROP ROLE ${rolname}`);
  });
}

async function withClient(
  url: string,
  use: (client: pg.Client) => Promise<unknown>,
): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await use(client);
  } finally {
    await client.end();
  }
}
