/** The text of an audit entry: what is hashed, byte for byte. */
import type { Actor } from './actor.ts';

export interface AuditInput {
  /** From the injected clock. */
  at: Date;
  /** The study whose chain this belongs to; null: the chain of the installation. */
  studyUid: string | null;
  /** What was done, as a short stable word pair such as `visit logged`. */
  action: string;
  /** What it was done to, by the name of its table. */
  entity: string;
  entityUid: string | null;
  before?: unknown;
  after?: unknown;
  reason?: string | null;
  /** Names another role than the actor's where one act of a request was allowed by another. */
  role?: string;
}

export const INSTALLATION_CHAIN = 'installation';

export function chainOf(entry: AuditInput): string {
  return entry.studyUid ?? INSTALLATION_CHAIN;
}

/** JSON with the keys of every object in order of code units, so that equal content is equal text. */
export function orderedJson(value: unknown): string {
  return JSON.stringify(value, (_key, held: unknown) => {
    if (held === null || typeof held !== 'object' || Array.isArray(held)) {
      return held;
    }
    return Object.fromEntries(
      Object.entries(held).sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0)),
    );
  });
}

export function entryBody(actor: Actor | null, entry: AuditInput): string {
  return orderedJson({
    at: entry.at.toISOString(),
    accountId: actor?.accountId ?? null,
    accountUid: actor?.accountUid ?? null,
    actorName: actor?.name ?? null,
    role: entry.role ?? actor?.role ?? null,
    sessionUid: actor?.sessionUid ?? null,
    requestId: actor?.requestId ?? null,
    action: entry.action,
    entity: entry.entity,
    entityUid: entry.entityUid,
    before: entry.before ?? null,
    after: entry.after ?? null,
    reason: entry.reason ?? null,
  });
}
