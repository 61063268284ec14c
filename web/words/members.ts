/** Who holds which duties in one study. */
import type { ProblemSentences } from './problems.ts';

export const membersWords = {
  heading: 'Members',
  sentence: 'Who holds which duty in this study. A change takes effect at the member’s next click.',
  noun: ['member', 'members'],
  caption: 'Members of this study',
  name: 'Name',
  email: 'E-mail',
  duties: 'Duties',
  since: 'Since',
  search: 'Name or e-mail',
  role: 'Duty',
  act: 'Act',
  disabled: 'account disabled',
  change: 'Change duties',
  remove: 'Remove',
  changeOf: (name: string) => `Change duties of ${name}`,
  removeOf: (name: string) => `Remove ${name}`,
  addHeading: 'Add a member',
  addSentence: 'The person needs an account first; the administrator creates it.',
  emailHint: 'The address of their account.',
  roles: 'Duties in this study',
  rolesHint:
    'Unblinded statistician and board member each exclude every other duty in the same study.',
  sites: 'Sites',
  sitesHint: 'A coordinator sees subjects of these sites only.',
  chair: 'Chairs the board',
  add: 'Add member',
  added: (name: string) => `${name} is a member now.`,
  heldNow: (duties: string) => `Held now: ${duties}.`,
  changeWhat: 'The pages open to this person change with their duties, at their next click.',
  changeAct: 'Save duties',
  changed: (name: string) => `The duties of ${name} are changed.`,
  removeHeading: (name: string) => `Remove ${name} from this study`,
  removeWhat:
    'They lose every page of this study at once. What they entered and signed stays, under their name.',
  removeAct: 'Remove from study',
  reason: 'Reason',
  reasonHint: 'Stands in the audit trail.',
  removed: (name: string) => `${name} is no longer a member.`,
  excludes: {
    'unblinded statistician':
      'The unblinded statistician knows the arms, so holds no other duty here.',
    'board member': 'A board member decides on released data only, so holds no other duty here.',
  },
  /** Sites are a list of their own, so duties are parted more strongly. */
  dutyList: (duties: readonly string[]) => duties.join('; '),
  coordinatorOf: (sites: string) => `coordinator of ${sites}`,
  needsSite: 'A coordinator needs at least one site.',
} as const;

export const membersProblems: ProblemSentences = {
  member_no_account:
    'No account with this address can be added. Ask the administrator to create it.',
  member_already: 'This person belongs to the study already. Change their duties instead.',
  member_administrator:
    'An administrator never sees study data, so this account can’t hold a duty here. Use another account of the person.',
  duties_exclude: 'A person who is {first} can’t also be {second} in the same study: {why}',
  member_last_owner:
    'A study keeps at least one owner who can sign in. Make somebody else owner first.',
  coordinator_needs_site: 'A coordinator works at one or more sites. Choose them.',
  sites_without_coordinator:
    'Sites are chosen for a coordinator only. Take them away, or add that duty.',
  site_unknown: 'One of the chosen sites does not belong to this study.',
  chair_needs_board: 'The chair is one of the board members. Add that duty, or take the mark away.',
  study_closed: 'The study is closed; its members no longer change.',
};
