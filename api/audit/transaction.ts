/** The one way to change a record: a transaction that carries its audit entries. */
import type { DataSource, EntityManager } from 'typeorm';
import type { Actor } from './actor.ts';
import { type AuditInput, chainOf, entryBody } from './entry-body.ts';

export interface Tx {
  manager: EntityManager;
  actor: Actor | null;
  /** Collects an entry; it is written just before the transaction commits, or not at all. */
  audit(entry: AuditInput): void;
}

/**
 * Runs `work` in one READ COMMITTED transaction and appends what it audited.
 *
 * Appending locks the head of a chain until the end, so it comes last: a writer that held a head while
 * waiting for a row would meet one that holds the row while waiting for the head. With several chains the
 * heads are taken in order of their names, for the same reason.
 *
 * @param actor null for the system itself, such as an hourly job
 */
export async function inTransaction<T>(
  db: DataSource,
  actor: Actor | null,
  work: (tx: Tx) => Promise<T>,
): Promise<T> {
  return db.transaction('READ COMMITTED', async (manager) => {
    const entries: AuditInput[] = [];
    const result = await work({
      manager,
      actor,
      audit: (entry) => {
        entries.push(entry);
      },
    });
    const ordered = entries
      .map((entry) => ({ chain: chainOf(entry), body: entryBody(actor, entry) }))
      .sort((a, b) => (a.chain < b.chain ? -1 : a.chain > b.chain ? 1 : 0));
    for (const { chain, body } of ordered) {
      await manager.query('SELECT audit.append($1, $2)', [chain, body]);
    }
    return result;
  });
}
