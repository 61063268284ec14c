import { migrate } from '../database/migrate.ts';
import type { RoleSettings } from '../database/role-names.ts';
import { createQueues } from './jobs/queues.ts';

/**
 * Brings a database to the present schema, its roles and its queues.
 * @param ownerUrl address as the owner of the database
 * @returns the names of the migrations that were run
 */
export async function prepareDatabase(ownerUrl: string, roles: RoleSettings): Promise<string[]> {
  const run = await migrate(ownerUrl, roles);
  await createQueues(ownerUrl, roles);
  return run;
}
