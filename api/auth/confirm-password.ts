/** The password entered again, for what binds a person: a signature, or a new password. */
import { Account } from '../../database/entities/index.ts';
import type { Actor } from '../audit/actor.ts';
import { inTransaction } from '../audit/transaction.ts';
import type { AppDeps } from '../http/deps.ts';
import { Problem } from '../http/problems.ts';
import type { SignedInPerson } from '../http/request-facts.ts';
import { passwordMatches } from './passwords.ts';
import { countTry, forgiveTry } from './rate-limit.ts';
import { passwordAgainLimits } from './sign-in-limits.ts';

/**
 * @param field entry of the body that holds the password
 * @throws Problem `password_wrong` or `password_tries_spent`
 */
export async function confirmPassword(
  deps: Pick<AppDeps, 'databases' | 'clock'>,
  person: SignedInPerson,
  actor: Actor,
  password: string,
  field = 'password',
): Promise<void> {
  const db = deps.databases.masked;
  const now = deps.clock();
  const limits = passwordAgainLimits(person.accountUid, person.sessionUid);
  const verdict = await countTry(db, limits, now);
  if (!verdict.allowed) {
    throw new Problem(
      'password_tries_spent',
      { minutes: Math.ceil(verdict.waitSeconds / 60) },
      { retryAfter: verdict.waitSeconds },
    );
  }
  const account = await db.getRepository(Account).findOneByOrFail({ id: person.accountId });
  if (await passwordMatches(account.passwordHash, password)) {
    await forgiveTry(db, limits, now);
    return;
  }
  await inTransaction(db, actor, async (tx) => {
    tx.audit({
      at: now,
      studyUid: null,
      action: 'password refused',
      entity: 'account',
      entityUid: person.accountUid,
    });
  });
  throw new Problem('password_wrong', {}, { errors: [{ path: field, message: '' }] });
}
