/** Makes the queue's tables as the owner of the database; the server itself may only fill and empty them. */

import pg from 'pg';
import PgBoss from 'pg-boss';
import { type RoleSettings, roleName } from '../../database/role-names.ts';

export const QUEUE_SCHEMA = 'queue';
/** Long work of people. */
export const WORK_QUEUE = 'work';
/** The hourly upkeep: heads of the audit chains, rows that count nothing any more. */
export const UPKEEP_QUEUE = 'upkeep';

/** Run after every migration; does nothing where all stands already. */
export async function createQueues(
  ownerUrl: string,
  roles: Pick<RoleSettings, 'rolePrefix'>,
): Promise<void> {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: QUEUE_SCHEMA,
    max: 2,
    schedule: false,
    supervise: false,
  });
  // Each fault reaches the caller as a rejection as well; without a listener Node would end on it.
  let fault: Error | undefined;
  boss.on('error', (error) => {
    fault = error;
  });
  await boss.start();
  try {
    for (const name of [WORK_QUEUE, UPKEEP_QUEUE]) await boss.createQueue(name);
    if (fault) throw fault;
  } finally {
    await boss.stop({ graceful: false });
  }
  await grantQueue(ownerUrl, roleName(roles.rolePrefix, 'masked'));
}

/** Only the masked role starts and does work: nothing of the queue is for the others. */
async function grantQueue(ownerUrl: string, role: string): Promise<void> {
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query(`GRANT USAGE ON SCHEMA ${QUEUE_SCHEMA} TO ${role}`);
    await client.query(
      `GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA ${QUEUE_SCHEMA} TO ${role}`,
    );
    await client.query(`GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA ${QUEUE_SCHEMA} TO ${role}`);
  } finally {
    await client.end();
  }
}
