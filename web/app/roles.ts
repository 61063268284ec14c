/** A membership in words: "coordinator, Alder", "chair of the board", "owner and analyst". */
import { words } from '../words/en.ts';
import type { Membership } from './session.ts';

export function rolesInWords(membership: Membership): string {
  const names = membership.roles.map((role) => {
    if (role === 'coordinator' && membership.sites.length > 0) {
      return `${words.roles[role]}, ${words.common.list(membership.sites.map(({ name }) => name))}`;
    }
    return role === 'board member' && membership.chair
      ? `${words.roles[role]}, ${words.chair}`
      : words.roles[role];
  });
  return names.join('; ');
}
