/**
 * An import of 20,000 rows: how long its parts take, and how long the server's own loop stands still
 * meanwhile, against the same file parsed in that loop.
 */
import { randomBytes } from 'node:crypto';
import { monitorEventLoopDelay } from 'node:perf_hooks';
import Papa from 'papaparse';
import pg from 'pg';
import { prepareDatabase } from '../../api/prepare-database.ts';
import { openDatabases } from '../../database/data-source.ts';
import { roleUrls } from '../../database/role-names.ts';
import { startThrowAwayCluster } from '../../database/server/throw-away-cluster.ts';
import { MAPPING, makeImportStudy } from '../api/import-study.ts';
import type { TestDatabase } from '../support/test-database.ts';
import { ms, printLimit } from './measure.ts';

export const title = 'Import of 20,000 rows (dry run and apply)';

const LIMIT_MS = 50;
const ROWS = 20_000;
const MS_A_NANO = 1e-6;

export async function run(): Promise<void> {
  const cluster = await startThrowAwayCluster(process.env);
  try {
    const database = await databaseOf(cluster.urlFor('postgres'));
    try {
      await measure(database);
    } finally {
      await database.drop();
    }
  } finally {
    await cluster.stop();
  }
}

async function databaseOf(ownerUrl: string): Promise<TestDatabase> {
  const secret = () => randomBytes(18).toString('base64url');
  const roles = {
    rolePrefix: 'bench',
    passwords: { masked: secret(), board: secret(), open: secret() },
  };
  await prepareDatabase(ownerUrl, roles);
  const urls = roleUrls(ownerUrl, roles);
  const databases = await openDatabases({ urls, poolSize: 3 });
  const owner = new pg.Pool({ connectionString: ownerUrl, max: 1 });
  return {
    name: 'postgres',
    ownerUrl,
    urls,
    roles,
    databases: async () => databases,
    async query<Row extends pg.QueryResultRow>(sql: string, values: readonly unknown[] = []) {
      return (await owner.query<Row>(sql, [...values])).rows;
    },
    async drop() {
      await databases.close();
      await owner.end();
    },
  };
}

async function measure(database: TestDatabase): Promise<void> {
  const study = await makeImportStudy(database);
  try {
    const text = fileOf(ROWS);
    const mapping = {
      ...MAPPING,
      newSubjects: {
        site: { from: 'fixed' as const, value: 'quay' },
        consentVersion: { from: 'fixed' as const, value: '1' },
        consentDate: { from: 'fixed' as const, value: '2025-01-01' },
        baselineDate: { from: 'fixed' as const, value: '2026-06-01' },
        order: 'year-month-day' as const,
      },
    };
    // The first file starts the thread; a server that runs has it.
    await study.check(await study.upload(fileOf(10)), mapping);
    const delay = monitorEventLoopDelay({ resolution: 5 });
    delay.enable();
    const begun = performance.now();
    const uploaded = await study.upload(text);
    const looked = performance.now();
    const checked = await study.check(uploaded, mapping);
    const judged = performance.now();
    const applied = await study.apply(checked);
    const written = performance.now();
    delay.disable();
    if (applied.state !== 'applied') throw new Error(`the import ended as ${applied.state}`);
    const inLoop = timeOf(() => Papa.parse(text, { header: true }));
    console.log(
      `  looked at in ${ms(looked - begun)}, dry run ${ms(judged - looked)}, applied ${ms(written - judged)}`,
    );
    const longest = delay.max * MS_A_NANO;
    printLimit('longest stand-still of the server’s loop', longest, LIMIT_MS);
    console.log(
      `  the same file parsed in the loop stops it for ${ms(inLoop)}, ratio ${(longest / inLoop).toFixed(2)}`,
    );
  } finally {
    await study.close();
  }
}

function timeOf(work: () => unknown): number {
  const begun = performance.now();
  work();
  return performance.now() - begun;
}

function fileOf(rows: number): string {
  const lines = ['subject,day,weight'];
  for (let row = 0; row < rows; row += 1) {
    lines.push(`B${1000 + (row % 200)},${-Math.floor(row / 200)},${60 + (row % 9)}`);
  }
  return lines.join('\n');
}
