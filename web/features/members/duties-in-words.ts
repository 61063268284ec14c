import type { MemberView } from '../../../api/contracts/members.ts';
import { words } from '../../words/en.ts';

/** "coordinator of Alder and Birch", "board member, chair". */
export function dutiesInWords(member: MemberView): string {
  return words.members.dutyList(
    member.roles.map((role) => {
      if (role === 'coordinator' && member.sites.length > 0) {
        return words.members.coordinatorOf(words.common.list(member.sites.map(({ name }) => name)));
      }
      return role === 'board member' && member.chair
        ? `${words.roles[role]}, ${words.chair}`
        : words.roles[role];
    }),
  );
}
