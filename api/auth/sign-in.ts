/** Signing in. Wrong password, unknown address and disabled account take the same time and the same words. */
import { randomUUID } from 'node:crypto';
import { Account } from '../../database/entities/index.ts';
import { inTransaction } from '../audit/transaction.ts';
import type { SignInRequest } from '../contracts/auth.ts';
import type { AppDeps } from '../http/deps.ts';
import { Problem } from '../http/problems.ts';
import { addressFingerprint, emailFingerprint } from './fingerprint.ts';
import { passwordMatches } from './passwords.ts';
import { countTry, forgiveTry } from './rate-limit.ts';
import { openSession } from './sessions.ts';
import { signInLimits } from './sign-in-limits.ts';
import { readDevice, type SessionTokens, signDevice } from './tokens.ts';

type SignInDeps = Pick<AppDeps, 'databases' | 'secrets' | 'clock'>;

export interface Knock extends SignInRequest {
  /** Network address of the caller. */
  address: string | undefined;
  agent: string | undefined;
  deviceCookie: unknown;
  requestId: string;
}

export interface SignInResult {
  tokens: SessionTokens;
  device: string;
  mustChangePassword: boolean;
}

const AGENT_LENGTH = 160;

/** @throws Problem `sign_in_refused` or `sign_in_throttled` */
export async function signIn(deps: SignInDeps, knock: Knock): Promise<SignInResult> {
  const { jwtKey, hashKey } = deps.secrets;
  const db = deps.databases.masked;
  const now = deps.clock();
  const emailPrint = emailFingerprint(hashKey, knock.email);
  const addressPrint = addressFingerprint(hashKey, knock.address);
  const device = readDevice(jwtKey, knock.deviceCookie, emailPrint, now);
  const limits = signInLimits(emailPrint, addressPrint, device);

  const verdict = await countTry(db, limits, now);
  const account = await db
    .getRepository(Account)
    .createQueryBuilder('a')
    .where('lower(a.email) = lower(:email)', { email: knock.email })
    .getOne();
  const note = noteRefusal(deps, { account, emailPrint, addressPrint, requestId: knock.requestId });
  if (!verdict.allowed) {
    // One entry a window, so that a flood does not fill the trail.
    if (verdict.justReached) await note('sign-in throttled');
    throw new Problem(
      'sign_in_throttled',
      { minutes: Math.ceil(verdict.waitSeconds / 60) },
      { retryAfter: verdict.waitSeconds },
    );
  }
  const right = await passwordMatches(account?.passwordHash, knock.password);
  if (!account || !right || account.disabledAt) {
    await note('sign-in refused');
    throw new Problem('sign_in_refused');
  }
  await forgiveTry(db, limits, now);

  const actor = {
    accountId: account.id,
    accountUid: account.uid,
    name: account.name,
    role: account.administrator ? 'administrator' : null,
    sessionUid: null,
    requestId: knock.requestId,
  };
  const tokens = await inTransaction(db, actor, async (tx) => {
    const opened = await openSession(
      tx.manager,
      {
        accountId: account.id,
        addressHash: addressPrint,
        agent: knock.agent?.slice(0, AGENT_LENGTH) ?? null,
      },
      jwtKey,
      now,
    );
    tx.audit({
      at: now,
      studyUid: null,
      action: 'sign-in accepted',
      entity: 'account',
      entityUid: account.uid,
      after: { session: opened.session.uid, address: addressPrint },
    });
    return opened.tokens;
  });
  return {
    tokens,
    device: signDevice(jwtKey, device ?? randomUUID(), emailPrint, now),
    mustChangePassword: account.mustChangePassword,
  };
}

interface Refused {
  account: Account | null;
  emailPrint: string;
  addressPrint: string;
  requestId: string;
}

/** An address nobody has is kept as a fingerprint only: people type passwords into that field. */
function noteRefusal(deps: SignInDeps, refused: Refused) {
  return (action: 'sign-in refused' | 'sign-in throttled'): Promise<void> => {
    const { account, emailPrint, addressPrint, requestId } = refused;
    return inTransaction(deps.databases.masked, null, async (tx) => {
      tx.audit({
        at: deps.clock(),
        studyUid: null,
        action,
        entity: 'account',
        entityUid: account?.uid ?? null,
        after: { email: emailPrint, address: addressPrint, requestId },
      });
    });
  };
}
