/** The person's own account: preferences, password, sessions. */
import { IsNull, MoreThan } from 'typeorm';
import { Account, Session } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction } from '../../audit/transaction.ts';
import { confirmPassword } from '../../auth/confirm-password.ts';
import { hashPassword, refuseWeakPassword } from '../../auth/passwords.ts';
import { IDLE_MINUTES, limitsView } from '../../auth/session-limits.ts';
import { revokeSessions } from '../../auth/sessions.ts';
import type {
  ChangeMeRequest,
  ChangePasswordRequest,
  Me,
  MySessions,
} from '../../contracts/auth.ts';
import type { AppDeps } from '../../http/deps.ts';
import { Problem } from '../../http/problems.ts';
import type { SignedInPerson } from '../../http/request-facts.ts';
import { membershipsOf } from './memberships.ts';
import { administratorPlaces } from './places.ts';

export async function me(deps: AppDeps, person: SignedInPerson): Promise<Me> {
  const db = deps.databases.masked;
  const account = await db.getRepository(Account).findOneByOrFail({ id: person.accountId });
  return {
    account: {
      id: account.uid,
      email: account.email,
      name: account.name,
      administrator: account.administrator,
      mustChangePassword: account.mustChangePassword,
      theme: account.theme,
      timeZone: account.timeZone,
      version: account.version,
    },
    session: {
      ...limitsView(person.accessExpiresAt, person.absoluteExpiresAt),
      id: person.sessionUid,
    },
    memberships: account.administrator ? [] : await membershipsOf(db, account.id),
    places: account.administrator ? [...administratorPlaces] : [],
  };
}

export async function changeMe(
  deps: AppDeps,
  person: SignedInPerson,
  actor: Actor,
  change: ChangeMeRequest,
): Promise<Me> {
  await inTransaction(deps.databases.masked, actor, async (tx) => {
    const account = await tx.manager.findOneOrFail(Account, {
      where: { id: person.accountId },
      lock: { mode: 'pessimistic_write' },
    });
    if (account.version !== change.version) {
      throw new Problem('stale_version', { given: change.version, held: account.version });
    }
    const before = { theme: account.theme, timeZone: account.timeZone };
    account.theme = change.theme ?? account.theme;
    account.timeZone = change.timeZone ?? account.timeZone;
    account.version += 1;
    await tx.manager.save(account);
    tx.audit({
      at: deps.clock(),
      studyUid: null,
      action: 'preferences changed',
      entity: 'account',
      entityUid: account.uid,
      before,
      after: { theme: account.theme, timeZone: account.timeZone },
    });
  });
  return me(deps, person);
}

/** Ends every other session: whoever knew the old password is out. */
export async function changePassword(
  deps: AppDeps,
  person: SignedInPerson,
  actor: Actor,
  change: ChangePasswordRequest,
): Promise<void> {
  await confirmPassword(deps, person, actor, change.currentPassword, 'currentPassword');
  if (change.newPassword.normalize('NFKC') === change.currentPassword.normalize('NFKC')) {
    throw new Problem('password_same', {}, { errors: [{ path: 'newPassword', message: '' }] });
  }
  refuseWeakPassword(change.newPassword, person);
  const passwordHash = await hashPassword(change.newPassword);
  const now = deps.clock();
  await inTransaction(deps.databases.masked, actor, async (tx) => {
    await tx.manager.query(
      `UPDATE account SET password_hash = $2, must_change_password = false, version = version + 1
        WHERE id = $1`,
      [person.accountId, passwordHash],
    );
    const ended = await revokeSessions(
      tx.manager,
      { accountId: person.accountId, exceptUid: person.sessionUid },
      'password changed',
      now,
    );
    tx.audit({
      at: now,
      studyUid: null,
      action: 'password changed',
      entity: 'account',
      entityUid: person.accountUid,
      after: { otherSessionsEnded: ended },
    });
  });
}

/** Sessions that could still be used, newest first. */
export async function mySessions(deps: AppDeps, person: SignedInPerson): Promise<MySessions> {
  const now = deps.clock();
  const sessions = await deps.databases.masked.getRepository(Session).find({
    where: {
      accountId: person.accountId,
      revokedAt: IsNull(),
      absoluteExpiresAt: MoreThan(now),
      lastSeenAt: MoreThan(new Date(now.getTime() - IDLE_MINUTES * 60_000)),
    },
    order: { id: 'DESC' },
  });
  return {
    rows: sessions.map((session) => ({
      id: session.uid,
      current: session.uid === person.sessionUid,
      createdAt: session.createdAt.toISOString(),
      lastSeenAt: session.lastSeenAt.toISOString(),
      agent: session.agent,
    })),
  };
}

/** @throws Problem `not_found` for a session of others as well */
export async function endSession(
  deps: AppDeps,
  person: SignedInPerson,
  actor: Actor,
  sessionUid: string,
): Promise<void> {
  const now = deps.clock();
  const own = sessionUid === person.sessionUid;
  await inTransaction(deps.databases.masked, actor, async (tx) => {
    const ended = await revokeSessions(
      tx.manager,
      { accountId: person.accountId, uid: sessionUid },
      own ? 'signed out' : 'ended from another session',
      now,
    );
    if (ended === 0) throw new Problem('not_found');
    tx.audit({
      at: now,
      studyUid: null,
      action: own ? 'signed out' : 'session ended',
      entity: 'account',
      entityUid: person.accountUid,
      after: { session: sessionUid },
    });
  });
}
