/** The security log. */
import type { ProblemSentences } from './problems.ts';

export const securityWords = {
  heading: 'Security log',
  sentence:
    'Sign-ins and everything done to accounts. Entries can’t be changed or taken away; each carries the hash of the one before.',
  noun: ['entry', 'entries'],
  caption: 'Security log of this installation',
  number: 'Number',
  at: 'Time',
  action: 'What',
  by: 'By',
  about: 'About',
  address: 'Address',
  addressNote: 'A fingerprint: equal ones are the same network address.',
  reason: 'Reason',
  hash: 'Hash',
  nobody: 'nobody signed in',
  unknownAccount: 'no account',
  search: 'Name',
  from: 'From',
  until: 'Until',
  day: 'Day',
  empty: 'Nothing has been recorded yet.',
  actions: {
    'sign-in accepted': 'signed in',
    'sign-in refused': 'sign-in refused',
    'sign-in throttled': 'sign-in held back after many tries',
    'signed out': 'signed out',
    'session ended': 'session ended from elsewhere',
    'refresh token reused': 'session ended: its token was used twice',
    'password changed': 'password changed',
    'password refused': 'password change refused',
    'account created': 'account created',
    'account disabled': 'account disabled',
    'account enabled': 'account enabled',
    'account reset': 'new password given',
    'preferences changed': 'theme or time zone changed',
  },
} as const;

export const securityProblems: ProblemSentences = {};
