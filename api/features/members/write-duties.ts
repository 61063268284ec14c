/** Writes the duties of one person: rows that stay are kept, those taken away are marked so. */
import { type EntityManager, In, IsNull } from 'typeorm';
import { Membership, MembershipSite, Site } from '../../../database/entities/index.ts';
import type { StudyRole } from '../../contracts/common.ts';
import { Problem } from '../../http/problems.ts';

export interface AccountOfMember {
  id: string;
  uid: string;
}

/** @returns inner keys of the sites @throws Problem `site_unknown`, also for a site of another study */
export async function sitesOf(
  manager: EntityManager,
  studyId: string,
  siteUids: readonly string[],
): Promise<string[]> {
  const wanted = [...new Set(siteUids)];
  if (wanted.length === 0) return [];
  const sites = await manager.findBy(Site, { studyId, uid: In(wanted) });
  if (sites.length !== wanted.length) {
    throw new Problem('site_unknown', {}, { errors: [{ path: 'siteIds', message: '' }] });
  }
  return sites.map((site) => site.id);
}

export async function writeDuties(
  manager: EntityManager,
  studyId: string,
  account: AccountOfMember,
  duties: { roles: readonly StudyRole[]; chair: boolean; sites: readonly string[] },
  now: Date,
): Promise<void> {
  const held = await manager.findBy(Membership, {
    studyId,
    accountId: account.id,
    removedAt: IsNull(),
  });
  const wanted = new Set(duties.roles);
  // What goes away goes first: a duty that excludes the new one must not meet it.
  for (const membership of held.filter(({ role }) => !wanted.has(role))) {
    membership.removedAt = now;
    membership.version += 1;
    await manager.save(membership);
  }
  for (const role of wanted) {
    const chair = role === 'board member' && duties.chair;
    const kept = held.find((membership) => membership.role === role);
    const membership =
      kept ??
      (await manager.save(Membership, {
        studyId,
        accountId: account.id,
        role,
        chair,
        createdAt: now,
        removedAt: null,
      }));
    const sitesChanged =
      role === 'coordinator' && (await writeSites(manager, membership.id, duties.sites));
    if (kept && (kept.chair !== chair || sitesChanged)) {
      kept.chair = chair;
      kept.version += 1;
      await manager.save(kept);
    }
  }
}

async function writeSites(
  manager: EntityManager,
  membershipId: string,
  sites: readonly string[],
): Promise<boolean> {
  const held = (await manager.findBy(MembershipSite, { membershipId })).map(({ siteId }) => siteId);
  const gone = held.filter((site) => !sites.includes(site));
  const fresh = sites.filter((site) => !held.includes(site));
  if (gone.length > 0) await manager.delete(MembershipSite, { membershipId, siteId: In(gone) });
  for (const siteId of fresh) await manager.insert(MembershipSite, { membershipId, siteId });
  return gone.length > 0 || fresh.length > 0;
}
