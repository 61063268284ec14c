/** Requests with an `Idempotency-Key`: asked again, they get the first answer and do nothing twice. */
import { createHash } from 'node:crypto';
import type { Request } from 'express';
import type { DataSource } from 'typeorm';
import type { Clock } from '../clock.ts';
import { Problem } from './problems.ts';

/** A request that runs longer than this has lost its server, and its key may be taken over. */
const TAKEOVER_SECONDS = 120;
/** Answers are kept a day. */
const KEPT_HOURS = 24;

export interface Replay {
  status: number;
  /** Null where the answer had none, or was sealed and not kept. */
  body: string | null;
}

export interface HeldKey {
  accountId: string;
  key: string;
  route: string;
}

/** @throws Problem `idempotency_key_form` */
export function idempotencyKeyOf(req: Request): string | null {
  const key = req.get('idempotency-key');
  if (key === undefined) return null;
  if (!/^[A-Za-z0-9_-]{8,128}$/.test(key)) throw new Problem('idempotency_key_form');
  return key;
}

/** The path stands in it, so that one key for two studies is refused rather than mixed up. */
export function requestHash(req: Request): string {
  return createHash('sha256')
    .update(`${req.method} ${req.path}\n${JSON.stringify(req.body ?? null)}`)
    .digest('hex');
}

/**
 * Takes the key for this request.
 * @returns null where the key was free, else the answer given before
 * @throws Problem where the key belongs to another request or one that still runs
 */
export async function takeKey(
  db: DataSource,
  held: HeldKey,
  hash: string,
  clock: Clock,
): Promise<Replay | null> {
  const now = clock();
  const taken: unknown[] = await db.query(
    `INSERT INTO idempotency AS i (account_id, key, route, request_hash, created_at)
     VALUES ($1, $2, $3, $4, $5::timestamptz)
     ON CONFLICT (account_id, key, route) DO UPDATE
        SET request_hash = excluded.request_hash, status = NULL, body = NULL, created_at = excluded.created_at
      WHERE (i.status IS NULL AND i.created_at < $5::timestamptz - make_interval(secs => $6))
         OR i.created_at < $5::timestamptz - make_interval(hours => $7)
     RETURNING i.id`,
    [held.accountId, held.key, held.route, hash, now, TAKEOVER_SECONDS, KEPT_HOURS],
  );
  if (taken.length > 0) return null;
  const rows: { request_hash: string; status: number | null; body: string | null }[] =
    await db.query(
      'SELECT request_hash, status, body FROM idempotency WHERE account_id = $1 AND key = $2 AND route = $3',
      [held.accountId, held.key, held.route],
    );
  const row = rows[0];
  // The first request failed between the two statements and gave the key back.
  if (!row) throw new Problem('idempotency_running', {}, { retryAfter: 1 });
  if (row.request_hash !== hash) throw new Problem('idempotency_key_reused');
  if (row.status === null) throw new Problem('idempotency_running', {}, { retryAfter: 1 });
  return { status: row.status, body: row.body };
}

export async function keepAnswer(db: DataSource, held: HeldKey, answer: Replay): Promise<void> {
  await db.query(
    'UPDATE idempotency SET status = $4, body = $5 WHERE account_id = $1 AND key = $2 AND route = $3',
    [held.accountId, held.key, held.route, answer.status, answer.body],
  );
}

/** A refused request did nothing, so its key is free again. */
export async function giveKeyBack(db: DataSource, held: HeldKey): Promise<void> {
  await db.query(
    'DELETE FROM idempotency WHERE account_id = $1 AND key = $2 AND route = $3 AND status IS NULL',
    [held.accountId, held.key, held.route],
  );
}
