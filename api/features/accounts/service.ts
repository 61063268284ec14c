/** Accounts: made, closed, opened again and reset by the administrator. */
import { QueryFailedError } from 'typeorm';
import { Account } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction, type Tx } from '../../audit/transaction.ts';
import { hashPassword, temporaryPassword } from '../../auth/passwords.ts';
import { type RevokedReason, revokeSessions } from '../../auth/sessions.ts';
import type {
  AccountActRequest,
  AccountView,
  CreateAccountRequest,
  IssuedAccount,
} from '../../contracts/accounts.ts';
import type { AppDeps } from '../../http/deps.ts';
import { Problem } from '../../http/problems.ts';
import { accountView } from './account-repository.ts';
import { sendLetter } from './send-letter.ts';

async function viewOf(deps: AppDeps, uid: string): Promise<AccountView> {
  const view = await accountView(deps.databases.masked, uid);
  if (!view) throw new Problem('not_found');
  return view;
}

const UNIQUE_VIOLATION = '23505';

/** @throws Problem `account_exists` */
export async function createAccount(
  deps: AppDeps,
  actor: Actor,
  request: CreateAccountRequest,
): Promise<IssuedAccount> {
  const password = temporaryPassword();
  const passwordHash = await hashPassword(password);
  const now = deps.clock();
  const exists = () =>
    new Problem('account_exists', {}, { errors: [{ path: 'email', message: '' }] });
  const account = await inTransaction(deps.databases.masked, actor, async (tx) => {
    const taken = await tx.manager
      .createQueryBuilder(Account, 'a')
      .where('lower(a.email) = lower(:email)', { email: request.email })
      .getExists();
    if (taken) throw exists();
    const made = await tx.manager.save(Account, {
      ...request,
      passwordHash,
      mustChangePassword: true,
      createdAt: now,
    });
    tx.audit({
      at: now,
      studyUid: null,
      action: 'account created',
      entity: 'account',
      entityUid: made.uid,
      after: { email: made.email, name: made.name, administrator: made.administrator },
    });
    return made;
  }).catch((error: unknown) => {
    // Two administrators at once: the index is the judge.
    const code = error instanceof QueryFailedError ? error.driverError.code : undefined;
    throw code === UNIQUE_VIOLATION ? exists() : error;
  });
  return {
    account: await viewOf(deps, account.uid),
    temporaryPassword: password,
    letterSent: await sendLetter(deps, account, 'account created'),
  };
}

/** @throws Problem `account_own`, `account_already` or `account_last_administrator` */
export async function disableAccount(
  deps: AppDeps,
  actor: Actor,
  uid: string,
  request: AccountActRequest,
): Promise<AccountView> {
  if (uid === actor.accountUid) throw new Problem('account_own');
  await change(deps, actor, uid, request, async (tx, account) => {
    if (account.disabledAt) throw new Problem('account_already', { state: 'disabled' });
    if (account.administrator) await refuseLastAdministrator(tx, account);
    account.disabledAt = deps.clock();
    return { action: 'account disabled', end: 'account disabled' };
  });
  return viewOf(deps, uid);
}

/** @throws Problem `account_already` */
export async function enableAccount(
  deps: AppDeps,
  actor: Actor,
  uid: string,
  request: AccountActRequest,
): Promise<AccountView> {
  await change(deps, actor, uid, request, async (_tx, account) => {
    if (!account.disabledAt) throw new Problem('account_already', { state: 'active' });
    account.disabledAt = null;
    return { action: 'account enabled', end: null };
  });
  return viewOf(deps, uid);
}

/** A new temporary password; the old one and every session end. @throws Problem `account_own` */
export async function resetAccount(
  deps: AppDeps,
  actor: Actor,
  uid: string,
  request: AccountActRequest,
): Promise<IssuedAccount> {
  if (uid === actor.accountUid) throw new Problem('account_own');
  const password = temporaryPassword();
  const passwordHash = await hashPassword(password);
  const account = await change(deps, actor, uid, request, async (_tx, held) => {
    held.passwordHash = passwordHash;
    held.mustChangePassword = true;
    return { action: 'account reset', end: 'password reset' };
  });
  return {
    account: await viewOf(deps, uid),
    temporaryPassword: password,
    letterSent: await sendLetter(deps, account, 'account reset'),
  };
}

interface Change {
  action: 'account disabled' | 'account enabled' | 'account reset';
  /** Why the sessions of the account end; null leaves them. */
  end: RevokedReason | null;
}

async function change(
  deps: AppDeps,
  actor: Actor,
  uid: string,
  request: AccountActRequest,
  act: (tx: Tx, account: Account) => Promise<Change>,
): Promise<Account> {
  const now = deps.clock();
  return inTransaction(deps.databases.masked, actor, async (tx) => {
    const account = await tx.manager.findOne(Account, {
      where: { uid },
      lock: { mode: 'pessimistic_write' },
    });
    if (!account) throw new Problem('not_found');
    if (account.version !== request.version) {
      throw new Problem('stale_version', { given: request.version, held: account.version });
    }
    const state = () => (account.disabledAt ? 'disabled' : 'active');
    const before = { state: state(), mustChangePassword: account.mustChangePassword };
    const { action, end } = await act(tx, account);
    account.version += 1;
    await tx.manager.save(account);
    const sessionsEnded = end
      ? await revokeSessions(tx.manager, { accountId: account.id }, end, now)
      : 0;
    tx.audit({
      at: now,
      studyUid: null,
      action,
      entity: 'account',
      entityUid: account.uid,
      before,
      after: { state: state(), mustChangePassword: account.mustChangePassword, sessionsEnded },
      reason: request.reason,
    });
    return account;
  });
}

/** Locks every administrator in one order, so that two can't close each other at the same moment. */
async function refuseLastAdministrator(tx: Tx, account: Account): Promise<void> {
  const open: { id: string }[] = await tx.manager.query(
    'SELECT id FROM account WHERE administrator AND disabled_at IS NULL ORDER BY id FOR UPDATE',
  );
  if (!open.some(({ id }) => id !== account.id)) throw new Problem('account_last_administrator');
}
