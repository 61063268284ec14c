import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { pino } from 'pino';
import type { TestProject } from 'vitest/node';
import { openServices } from '../../api/cli/services.ts';
import { loadConfig } from '../../api/config.ts';
import { deriveSecrets } from '../../api/secrets.ts';
import { roleUrls } from '../../database/role-names.ts';
import { loadDemo } from '../../seeds-demo/load.ts';
import { TEST_MASTER_SECRET } from './test-cluster.ts';

let folder: string | undefined;

/** Plays the demo once for the run; each test file that wants it gets a copy of its database and files. */
export async function setup(project: TestProject): Promise<void> {
  const { cluster } = project.getProvidedContext();
  const template = `${cluster.databasePrefix}demo_${randomBytes(3).toString('hex')}`;
  const admin = new pg.Client({ connectionString: cluster.adminUrl });
  await admin.connect();
  await admin.query(`CREATE DATABASE ${template} TEMPLATE ${cluster.template} STRATEGY file_copy`);
  await admin.end();
  const ownerUrl = new URL(cluster.adminUrl);
  ownerUrl.pathname = `/${template}`;
  folder = mkdtempSync(join(tmpdir(), 'tetherline-demo-'));
  const services = await openServices(
    {
      config: loadConfig({ DEMO: 'off' }),
      secrets: deriveSecrets(TEST_MASTER_SECRET, 'test'),
      dataFolder: folder,
      urls: roleUrls(ownerUrl.toString(), cluster),
    },
    { logger: pino({ level: 'silent' }) },
  );
  try {
    await loadDemo(services.deps, new Date());
  } finally {
    await services.close();
  }
  project.provide('demo', { template, folder });
}

export function teardown(): void {
  if (folder) rmSync(folder, { recursive: true, force: true });
}
