/** The people of a study: added, given other duties, taken away; by the owner. */
import { Account, Study } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction, type Tx } from '../../audit/transaction.ts';
import type {
  AddMemberRequest,
  ChangeMemberRequest,
  MemberView,
  RemoveMemberRequest,
} from '../../contracts/members.ts';
import type { AppDeps } from '../../http/deps.ts';
import type { StudyMembership } from '../../http/membership.ts';
import { Problem } from '../../http/problems.ts';
import { memberOf, otherOwners } from './member-repository.ts';
import { type Duties, refuseDuties } from './policy.ts';
import { type AccountOfMember, sitesOf, writeDuties } from './write-duties.ts';

export interface MemberContext {
  deps: Pick<AppDeps, 'databases' | 'clock'>;
  actor: Actor;
  membership: StudyMembership;
}

/** @throws Problem where the person can't be added or the duties exclude each other */
export async function addMember(
  context: MemberContext,
  request: AddMemberRequest,
): Promise<MemberView> {
  const { membership } = context;
  refuseDuties(request);
  return change(context, null, async (tx, now) => {
    const account = await tx.manager
      .createQueryBuilder(Account, 'a')
      .where('lower(a.email) = lower(:email)', { email: request.email })
      .getOne();
    const at = { errors: [{ path: 'email', message: '' }] };
    if (!account || account.disabledAt) throw new Problem('member_no_account', {}, at);
    if (account.administrator) throw new Problem('member_administrator', {}, at);
    if (await memberOf(tx.manager, membership.studyId, account.uid)) {
      throw new Problem('member_already', {}, at);
    }
    await giveDuties(tx, context, account, request, now);
    return { account, action: 'member added', before: null, reason: null };
  });
}

/** @throws Problem `stale_version`, `member_last_owner`, and those of the duties */
export async function changeMember(
  context: MemberContext,
  accountUid: string,
  request: ChangeMemberRequest,
): Promise<MemberView> {
  refuseDuties(request);
  return change(context, accountUid, async (tx, now) => {
    const { account, before } = await memberForChange(tx, context, accountUid, request.version);
    if (!request.roles.includes('owner')) await refuseLastOwner(tx, context, before);
    await giveDuties(tx, context, account, request, now);
    return { account, action: 'member changed', before, reason: null };
  });
}

/** @throws Problem `stale_version` or `member_last_owner` */
export async function removeMember(
  context: MemberContext,
  accountUid: string,
  request: RemoveMemberRequest,
): Promise<void> {
  await change(context, accountUid, async (tx, now) => {
    const { account, before } = await memberForChange(tx, context, accountUid, request.version);
    await refuseLastOwner(tx, context, before);
    const none = { roles: [], chair: false, siteIds: [] };
    await giveDuties(tx, context, account, none, now);
    return { account, action: 'member removed', before, reason: request.reason };
  });
}

interface Change {
  account: Account;
  action: 'member added' | 'member changed' | 'member removed';
  before: MemberView | null;
  reason: string | null;
}

/** @returns the member afterwards; after a removal, as it was */
async function change(
  { deps, actor, membership }: MemberContext,
  accountUid: string | null,
  act: (tx: Tx, now: Date) => Promise<Change>,
): Promise<MemberView> {
  const now = deps.clock();
  return inTransaction(deps.databases.masked, actor, async (tx) => {
    // Changes of one study's people wait for each other: the last owner can't leave twice.
    const study = await tx.manager.findOneOrFail(Study, {
      where: { id: membership.studyId },
      lock: { mode: 'pessimistic_write' },
    });
    if (study.state === 'closed') throw new Problem('study_closed');
    const { account, action, before, reason } = await act(tx, now);
    const after = await memberOf(tx.manager, study.id, account.uid);
    tx.audit({
      at: now,
      studyUid: study.uid,
      action,
      entity: 'membership',
      entityUid: account.uid,
      before: before && dutiesOf(before),
      after: after && { account: account.uid, ...dutiesOf(after) },
      reason,
    });
    const left = after ?? before;
    if (!left) throw new Error(`nobody was changed by ${action} of ${accountUid}`);
    return left;
  });
}

function dutiesOf(member: MemberView) {
  const { roles, chair, sites } = member;
  return { roles, chair, sites: sites.map((site) => site.code) };
}

async function memberForChange(
  tx: Tx,
  { membership }: MemberContext,
  accountUid: string,
  version: number,
): Promise<{ account: Account; before: MemberView }> {
  const before = await memberOf(tx.manager, membership.studyId, accountUid);
  if (!before) throw new Problem('not_found');
  if (before.version !== version) {
    throw new Problem('stale_version', { given: version, held: before.version });
  }
  const account = await tx.manager.findOneByOrFail(Account, { uid: accountUid });
  return { account, before };
}

async function refuseLastOwner(
  tx: Tx,
  { membership }: MemberContext,
  member: MemberView,
): Promise<void> {
  if (!member.roles.includes('owner')) return;
  if ((await otherOwners(tx.manager, membership.studyId, member.id)) === 0) {
    throw new Problem('member_last_owner', {}, { errors: [{ path: 'roles', message: '' }] });
  }
}

async function giveDuties(
  tx: Tx,
  { membership }: MemberContext,
  account: AccountOfMember,
  duties: Duties,
  now: Date,
): Promise<void> {
  const sites = await sitesOf(tx.manager, membership.studyId, duties.siteIds);
  await writeDuties(tx.manager, membership.studyId, account, { ...duties, sites }, now);
}
