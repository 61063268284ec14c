/** What is done once an hour: the audit heads go outside the database, and spent rows go away. */
import type { DataSource } from 'typeorm';
import { anchorHeads } from '../audit/anchors.ts';
import { clearOldCounters } from '../auth/rate-limit.ts';
import { clearOldSessions } from '../auth/sessions.ts';
import type { Clock } from '../clock.ts';
import type { ObjectStore } from '../storage/object-store.ts';

export async function hourlyUpkeep(
  db: DataSource,
  store: ObjectStore,
  clock: Clock,
): Promise<void> {
  const now = clock();
  await anchorHeads(db, store, clock);
  await clearOldCounters(db, now);
  await clearOldSessions(db, now);
  await db.query("DELETE FROM idempotency WHERE created_at < $1::timestamptz - interval '1 day'", [
    now,
  ]);
}
