/** The first administrator, owner and study of an installation, made together or not at all. */
import type { DataSource } from 'typeorm';
import { Account, Membership, type Study } from '../../../database/entities/index.ts';
import { inTransaction, type Tx } from '../../audit/transaction.ts';
import { hashPassword, refuseWeakPassword } from '../../auth/passwords.ts';
import type { Clock } from '../../clock.ts';
import { emailSchema, newPasswordSchema } from '../../contracts/auth.ts';
import type { SetupFile } from '../../contracts/setup.ts';
import { Problem, type ProblemEntry } from '../../http/problems.ts';
import { createStudyFromSetup } from './service.ts';

export interface FirstPerson {
  email: string;
  name: string;
  password: string;
}

export interface FirstOwnerInput {
  administrator: FirstPerson;
  owner: FirstPerson;
  setup: SetupFile;
}

/**
 * @throws Problem `invalid_request` for an address or password that can't be used, `password_common`,
 * `password_personal`, `first_owner_same`, `account_exists`, `setup_study_exists`
 */
export async function makeFirstOwner(
  db: DataSource,
  clock: Clock,
  input: FirstOwnerInput,
): Promise<Study> {
  const administrator = checkPerson('administrator', input.administrator);
  const owner = checkPerson('owner', input.owner);
  if (administrator.email.toLowerCase() === owner.email.toLowerCase()) {
    throw new Problem('first_owner_same');
  }
  const now = clock();
  return inTransaction(db, null, async (tx) => {
    await accountWithPassword(tx, now, administrator, true);
    const account = await accountWithPassword(tx, now, owner, false);
    return foundStudy(tx, now, input.setup, account);
  });
}

/** A study from its set-up with the one member who can add the others. */
export async function foundStudy(
  tx: Tx,
  now: Date,
  setup: SetupFile,
  owner: Pick<Account, 'id' | 'uid'>,
): Promise<Study> {
  const study = await createStudyFromSetup(tx, now, setup);
  const membership = await tx.manager
    .getRepository(Membership)
    .save({ studyId: study.id, accountId: owner.id, role: 'owner', createdAt: now });
  tx.audit({
    at: now,
    studyUid: study.uid,
    action: 'member added',
    entity: 'membership',
    entityUid: membership.uid,
    after: { account: owner.uid, roles: ['owner'] },
  });
  return study;
}

function checkPerson(who: 'administrator' | 'owner', person: FirstPerson): FirstPerson {
  const email = emailSchema.safeParse(person.email);
  const password = newPasswordSchema.safeParse(person.password);
  const errors: ProblemEntry[] = [
    ...(email.error?.issues ?? []).map(({ message }) => ({ path: `${who}.email`, message })),
    ...(password.error?.issues ?? []).map(({ message }) => ({ path: `${who}.password`, message })),
  ];
  if (!email.success || !password.success) {
    throw new Problem('invalid_request', {}, { errors });
  }
  const checked = { ...person, email: email.data, password: password.data };
  refuseWeakPassword(checked.password, checked, `${who}.password`);
  return checked;
}

/** An account whose password is known from the start, and so need not be changed. */
export async function accountWithPassword(
  tx: Tx,
  now: Date,
  person: FirstPerson,
  administrator: boolean,
): Promise<Account> {
  const accounts = tx.manager.getRepository(Account);
  const held = await accounts
    .createQueryBuilder('account')
    .where('lower(account.email) = lower(:email)', { email: person.email })
    .getExists();
  if (held) {
    const path = administrator ? 'administrator.email' : 'owner.email';
    throw new Problem('account_exists', {}, { errors: [{ path, message: person.email }] });
  }
  const account = await accounts.save({
    email: person.email,
    name: person.name,
    passwordHash: await hashPassword(person.password),
    administrator,
    createdAt: now,
  });
  tx.audit({
    at: now,
    studyUid: null,
    action: 'account created',
    entity: 'account',
    entityUid: account.uid,
    after: { email: account.email, name: account.name, administrator },
  });
  return account as Account;
}
