/** The administrator's list of accounts. */
import type { ProblemSentences } from './problems.ts';

export const accountsWords = {
  heading: 'Accounts',
  sentence:
    'Everyone who can sign in. An administrator’s account holds no membership in any study.',
  noun: ['account', 'accounts'],
  caption: 'Accounts of this installation',
  name: 'Name',
  email: 'E-mail',
  kind: 'Kind',
  kinds: { member: 'member of studies', administrator: 'administrator' },
  state: 'State',
  states: { active: 'active', disabled: 'disabled' },
  waiting: 'temporary password',
  created: 'Created',
  lastSeen: 'Last seen',
  never: 'never',
  search: 'Name or e-mail',
  act: 'Act',
  disable: 'Disable',
  enable: 'Enable',
  reset: 'New password',
  disableOf: (name: string) => `Disable the account of ${name}`,
  enableOf: (name: string) => `Enable the account of ${name}`,
  resetOf: (name: string) => `Give ${name} a new password`,
  disableWhat:
    'All sessions of this person end at once, and they can’t sign in. What they entered and signed stays.',
  enableWhat: 'The person can sign in again with the password they had.',
  resetWhat:
    'All sessions of this person end at once. You see a temporary password once; they have to change it at the next sign-in.',
  disableAct: 'Disable account',
  enableAct: 'Enable account',
  resetAct: 'Make a new password',
  reason: 'Reason',
  reasonHint: 'Stands in the security log.',
  disabledNotice: (name: string) => `The account of ${name} is disabled.`,
  enabledNotice: (name: string) => `The account of ${name} is enabled.`,
  createHeading: 'Create an account',
  createSentence: 'A temporary password is shown once. Hand it over in person or by telephone.',
  kindLegend: 'Kind of account',
  memberNote: 'Owners of studies add this person to their study.',
  administratorNote: 'Looks after accounts; never sees study data.',
  create: 'Create account',
  issuedHeading: (name: string) => `Temporary password for ${name}`,
  issuedWhat: 'It is shown now and never again. The person has to change it at the first sign-in.',
  letterSent: 'A letter without the password is on its way to the person.',
  noLetter: 'No letter was sent: no mail server is set up here. Tell the person yourself.',
  issuedDone: 'I have written it down',
} as const;

export const accountsProblems: ProblemSentences = {
  account_exists: 'An account with this address exists already.',
  account_own: 'You can’t do this to your own account. Ask another administrator.',
  account_last_administrator:
    'This is the last administrator who can sign in. Make another one first.',
  account_already: 'The account is {state} already.',
};
