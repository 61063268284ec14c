import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { type Databases, openDatabases } from '../../database/data-source.ts';
import { type ByDatabaseRole, type RoleSettings, roleUrls } from '../../database/role-names.ts';
import './test-cluster.ts';

export interface TestDatabase {
  name: string;
  ownerUrl: string;
  /** Address for each database role. */
  urls: ByDatabaseRole<string>;
  roles: RoleSettings;
  /** One DataSource a role; closed by `drop`. */
  databases(): Promise<Databases>;
  /** Runs one statement as the owner, for reading what was stored. */
  query<Row extends pg.QueryResultRow>(sql: string, values?: readonly unknown[]): Promise<Row[]>;
  /** Closes what was opened here. The database itself goes with the cluster: dropping would cut late sockets. */
  drop(): Promise<void>;
}

/** A database of one's own in about 20 ms: a copy of the migrated template, or of the one that is named. */
export async function createTestDatabase(template?: string): Promise<TestDatabase> {
  const cluster = inject('cluster');
  const name = `${cluster.databasePrefix}${randomBytes(6).toString('hex')}`;
  const admin = new pg.Client({ connectionString: cluster.adminUrl });
  await admin.connect();
  try {
    await admin.query(
      `CREATE DATABASE ${name} TEMPLATE ${template ?? cluster.template} STRATEGY file_copy`,
    );
  } finally {
    await admin.end();
  }
  const url = new URL(cluster.adminUrl);
  url.pathname = `/${name}`;
  const ownerUrl = url.toString();
  const urls = roleUrls(ownerUrl, cluster);
  const owner = new pg.Pool({ connectionString: ownerUrl, max: 2 });
  let opened: Promise<Databases> | undefined;
  return {
    name,
    ownerUrl,
    urls,
    roles: { rolePrefix: cluster.rolePrefix, passwords: cluster.passwords },
    databases() {
      opened ??= openDatabases({ urls, poolSize: 5 });
      return opened;
    },
    async query<Row extends pg.QueryResultRow>(sql: string, values: readonly unknown[] = []) {
      const result = await owner.query<Row>(sql, [...values]);
      return result.rows;
    },
    async drop() {
      if (opened) await (await opened).close();
      await owner.end();
    },
  };
}
