/** Who may manage the people of a study, and which duties exclude each other. */
import type { StudyRole } from '../../contracts/common.ts';
import { Problem } from '../../http/problems.ts';
import { exclusionReasons } from '../../words/members.ts';

export const mayManageMembers = { study: ['owner'] } as const;

/** Each of these excludes every other duty in the same study. */
const ALONE = ['unblinded statistician', 'board member'] as const;

export interface Duties {
  roles: readonly StudyRole[];
  chair: boolean;
  siteIds: readonly string[];
}

/** @throws Problem that names the duties and why, with the entry of the form that is at fault */
export function refuseDuties(duties: Duties): void {
  const roles = [...new Set(duties.roles)];
  const at = (path: string) => ({ errors: [{ path, message: '' }] });
  for (const alone of ALONE) {
    const other = roles.find((role) => role !== alone);
    if (roles.includes(alone) && other) {
      throw new Problem(
        'duties_exclude',
        { first: alone, second: other, why: exclusionReasons[alone] },
        at('roles'),
      );
    }
  }
  if (duties.chair && !roles.includes('board member')) {
    throw new Problem('chair_needs_board', {}, at('chair'));
  }
  const coordinates = roles.includes('coordinator');
  if (coordinates && duties.siteIds.length === 0) {
    throw new Problem('coordinator_needs_site', {}, at('siteIds'));
  }
  if (!coordinates && duties.siteIds.length > 0) {
    throw new Problem('sites_without_coordinator', {}, at('siteIds'));
  }
}
