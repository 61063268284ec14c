import { setTimeout as pause } from 'node:timers/promises';
import type { Logger } from 'pino';
import { roleUrls } from '../../database/role-names.ts';
import { systemClock } from '../clock.ts';
import { prepareDatabase } from '../prepare-database.ts';
import { asAdmin, DEMO_DATABASE, databaseExists, type Installation } from './installation.ts';
import { openServices } from './services.ts';

const DRAFT = `${DEMO_DATABASE}_draft`;
const SOCKETS_CLOSE_WITHIN_MS = 10_000;

/**
 * Makes the demo's database once. It is filled under another name and renamed at the end, so that a start
 * that is cut off never leaves half a demo.
 * @returns false where it was there already
 */
export async function seedDemoOnce(
  installation: Installation,
  logger: Logger,
  say: () => void,
): Promise<boolean> {
  const urlFor = installation.privateUrlFor;
  if (urlFor === undefined) throw new Error('the demo needs the private database');
  const adminUrl = urlFor('postgres');
  if (await databaseExists(adminUrl, DEMO_DATABASE)) return false;
  say();
  // Read only now: later starts do without the demo's people and readings.
  const { loadDemo } = await import('../../seeds-demo/load.ts');
  await asAdmin(adminUrl, async (client) => {
    await client.query(`DROP DATABASE IF EXISTS ${DRAFT}`);
    await client.query(`CREATE DATABASE ${DRAFT}`);
  });
  const ownerUrl = urlFor(DRAFT);
  await prepareDatabase(ownerUrl, installation.roles);
  const urls = roleUrls(ownerUrl, installation.roles);
  const services = await openServices({ ...installation, urls }, { logger });
  try {
    await loadDemo(services.deps, systemClock());
  } finally {
    await services.close();
  }
  await rename(adminUrl);
  return true;
}

/** A closed pool's sockets take a moment to go, and a database with connections can't be renamed. */
async function rename(adminUrl: string): Promise<void> {
  const deadline = Date.now() + SOCKETS_CLOSE_WITHIN_MS;
  for (;;) {
    try {
      await asAdmin(adminUrl, (client) =>
        client.query(`ALTER DATABASE ${DRAFT} RENAME TO ${DEMO_DATABASE}`),
      );
      return;
    } catch (error) {
      const inUse = (error as { code?: string }).code === '55006';
      if (!inUse || Date.now() > deadline) throw error;
      await pause(50);
    }
  }
}
