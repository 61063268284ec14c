/** Who sees subjects, and of which sites. */
import type { StudyMembership } from '../../http/membership.ts';

/** In the order in which a role is named as the one that allowed it. */
export const maySeeSubjects = { study: ['owner', 'monitor', 'coordinator'] } as const;

/** Owners and monitors reach every site; a coordinator those they work for. Null: every site. */
export function sitesInReach(membership: StudyMembership): readonly string[] | null {
  const everywhere = membership.roles.includes('owner') || membership.roles.includes('monitor');
  return everywhere ? null : membership.siteIds;
}
