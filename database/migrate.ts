/** Brings a database to the present schema: roles, tables, rights. */
import pg from 'pg';
import { ownerDataSource } from './data-source.ts';
import { grantRights } from './rights.ts';
import type { RoleSettings } from './role-names.ts';
import { ensureRoles } from './roles.ts';

export { CreateRoleMissing } from './roles.ts';

/** Two servers that start at once migrate one after the other. */
const MIGRATION_LOCK = 6_045_311;

/**
 * @param ownerUrl address of the database as a user who owns it
 * @returns the names of the migrations that were run
 * @throws CreateRoleMissing where the roles are missing and this user may not make them
 */
export async function migrate(ownerUrl: string, settings: RoleSettings): Promise<string[]> {
  const client = new pg.Client({
    connectionString: ownerUrl,
    application_name: 'tetherline migrate',
  });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await ensureRoles(client, settings);
    return await migrateTables(ownerUrl, settings.rolePrefix);
  } finally {
    await client.end();
  }
}

async function migrateTables(ownerUrl: string, rolePrefix: string): Promise<string[]> {
  const source = ownerDataSource(ownerUrl);
  await source.initialize();
  try {
    const run = await source.runMigrations();
    const runner = source.createQueryRunner();
    try {
      await runner.startTransaction();
      await grantRights(runner, rolePrefix);
      await runner.commitTransaction();
    } catch (error) {
      await runner.rollbackTransaction();
      throw error;
    } finally {
      await runner.release();
    }
    return run.map((migration) => migration.name);
  } finally {
    await source.destroy();
  }
}
