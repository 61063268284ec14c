/** Sessions: opened at sign-in, renewed by a token that works once, ended on the server. */
import { type DataSource, type EntityManager, IsNull, Not } from 'typeorm';
import { RefreshToken, Session } from '../../database/entities/index.ts';
import { inTransaction } from '../audit/transaction.ts';
import type { SignedInPerson } from '../http/request-facts.ts';
import { ABSOLUTE_HOURS, endOf, type SessionEnd } from './session-limits.ts';
import {
  ACCESS_MINUTES,
  newOpaqueToken,
  type SessionTokens,
  signAccess,
  tokenHash,
} from './tokens.ts';

/** Why a session was ended on the server; stands in the audit trail and in the list of sessions. */
export type RevokedReason =
  | 'signed out'
  | 'ended from another session'
  | 'password changed'
  | 'password reset'
  | 'account disabled'
  | 'refresh token used twice';

/** Seconds between two notes of "last seen"; each request would write a row otherwise. */
const SEEN_EVERY_SECONDS = 15;

export interface Opening {
  accountId: string;
  addressHash: string;
  agent: string | null;
}

function tokensOf(session: Session, refresh: string, jwtKey: string, now: Date): SessionTokens {
  const accessExpiresAt = new Date(
    Math.min(now.getTime() + ACCESS_MINUTES * 60_000, session.absoluteExpiresAt.getTime()),
  );
  return {
    access: signAccess(jwtKey, session.uid, now, accessExpiresAt),
    accessExpiresAt,
    refresh,
    absoluteExpiresAt: session.absoluteExpiresAt,
  };
}

async function issueRefresh(manager: EntityManager, session: Session, now: Date): Promise<string> {
  const refresh = newOpaqueToken();
  await manager.insert(RefreshToken, {
    sessionId: session.id,
    tokenHash: tokenHash(refresh),
    issuedAt: now,
    expiresAt: session.absoluteExpiresAt,
  });
  return refresh;
}

export async function openSession(
  manager: EntityManager,
  opening: Opening,
  jwtKey: string,
  now: Date,
): Promise<{ session: Session; tokens: SessionTokens }> {
  const session = await manager.save(Session, {
    ...opening,
    createdAt: now,
    lastSeenAt: now,
    absoluteExpiresAt: new Date(now.getTime() + ABSOLUTE_HOURS * 3_600_000),
  });
  const refresh = await issueRefresh(manager, session, now);
  return { session, tokens: tokensOf(session, refresh, jwtKey, now) };
}

/** Ends live sessions of one account. @returns how many */
export async function revokeSessions(
  manager: EntityManager,
  which: { accountId: string; uid?: string; exceptUid?: string },
  reason: RevokedReason,
  now: Date,
): Promise<number> {
  const result = await manager.update(
    Session,
    {
      accountId: which.accountId,
      revokedAt: IsNull(),
      ...(which.uid ? { uid: which.uid } : {}),
      ...(which.exceptUid ? { uid: Not(which.exceptUid) } : {}),
    },
    { revokedAt: now, revokedReason: reason },
  );
  return result.affected ?? 0;
}

interface PersonRow {
  account_id: string;
  account_uid: string;
  email: string;
  name: string;
  administrator: boolean;
  must_change_password: boolean;
  disabled_at: Date | null;
  session_id: string;
  session_uid: string;
  created_at: Date;
  last_seen_at: Date;
  absolute_expires_at: Date;
  revoked_at: Date | null;
}

/** Who stands behind a session, or how it ended; null where there is none of that id. */
export async function personOfSession(
  db: DataSource,
  sessionUid: string,
  now: Date,
): Promise<Omit<SignedInPerson, 'accessExpiresAt'> | SessionEnd | null> {
  const rows: PersonRow[] = await db.query(
    `SELECT a.id AS account_id, a.uid AS account_uid, a.email, a.name, a.administrator,
            a.must_change_password, a.disabled_at, s.id AS session_id, s.uid AS session_uid,
            s.created_at, s.last_seen_at, s.absolute_expires_at, s.revoked_at
       FROM session s JOIN account a ON a.id = s.account_id WHERE s.uid = $1`,
    [sessionUid],
  );
  const row = rows[0];
  if (!row) return null;
  const end = endOf(
    {
      lastSeenAt: row.last_seen_at,
      absoluteExpiresAt: row.absolute_expires_at,
      revokedAt: row.revoked_at,
      disabledAt: row.disabled_at,
    },
    now,
  );
  if (end) return end;
  return {
    accountId: row.account_id,
    accountUid: row.account_uid,
    email: row.email,
    name: row.name,
    administrator: row.administrator,
    mustChangePassword: row.must_change_password,
    sessionId: row.session_id,
    sessionUid: row.session_uid,
    sessionCreatedAt: row.created_at,
    lastSeenAt: row.last_seen_at,
    absoluteExpiresAt: row.absolute_expires_at,
  };
}

/** Notes that a person is at work; keeps the idle limit away. */
export async function touchSession(
  db: DataSource,
  sessionId: string,
  lastSeenAt: Date,
  now: Date,
): Promise<void> {
  if (now.getTime() - lastSeenAt.getTime() < SEEN_EVERY_SECONDS * 1_000) return;
  await db.query('UPDATE session SET last_seen_at = greatest(last_seen_at, $2) WHERE id = $1', [
    sessionId,
    now,
  ]);
}

export type Renewal =
  | { tokens: SessionTokens; mustChangePassword: boolean }
  | { ended: SessionEnd | 'reused' };

/**
 * Trades a refresh token for new tokens. A token that comes a second time was copied: whoever holds the
 * newer one can't be told from the thief, so the session ends for both.
 */
export async function renewSession(
  db: DataSource,
  refresh: string,
  jwtKey: string,
  now: Date,
  requestId: string,
): Promise<Renewal> {
  return inTransaction(db, null, async (tx): Promise<Renewal> => {
    // The row stays locked to the end, so that of two uses at once one is the second.
    const token = await tx.manager.findOne(RefreshToken, {
      where: { tokenHash: tokenHash(refresh) },
      lock: { mode: 'pessimistic_write' },
    });
    if (!token) return { ended: 'signed out' };
    const session = await tx.manager.findOneOrFail(Session, {
      where: { id: token.sessionId },
      relations: { account: true },
    });
    const disabledAt = session.account?.disabledAt ?? null;
    const end = endOf({ ...session, disabledAt }, now);
    if (end) return { ended: end };
    if (token.usedAt) {
      await revokeSessions(tx.manager, session, 'refresh token used twice', now);
      tx.audit({
        at: now,
        studyUid: null,
        action: 'refresh token reused',
        entity: 'account',
        entityUid: session.account?.uid ?? null,
        after: { session: session.uid, address: session.addressHash, requestId },
        reason: 'refresh token used twice',
      });
      return { ended: 'reused' };
    }
    await tx.manager.update(RefreshToken, { id: token.id }, { usedAt: now });
    const renewed = await issueRefresh(tx.manager, session, now);
    return {
      tokens: tokensOf(session, renewed, jwtKey, now),
      mustChangePassword: session.account?.mustChangePassword ?? false,
    };
  });
}

/** Sessions that ended more than a month ago, with their tokens; the audit trail keeps what happened. */
export async function clearOldSessions(db: DataSource, now: Date): Promise<void> {
  await db.query(
    "DELETE FROM session WHERE absolute_expires_at < $1::timestamptz - interval '30 days'",
    [now],
  );
}
