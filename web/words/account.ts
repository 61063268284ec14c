/** A person's own account. */
import { counted } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

export const accountWords = {
  heading: 'Your account',
  sentence: (name: string, email: string) =>
    `${name}, ${email}. The administrator changes names and addresses.`,
  preferences: 'How pages look to you',
  theme: 'Theme',
  themes: { system: 'As the system says', light: 'Light', dark: 'Dark' },
  timeZone: 'Time zone',
  timeZoneHint:
    'Times are shown in this zone, and always with it. Visits keep the days of their site.',
  timeNow: (moment: string) => `Now: ${moment}`,
  savePreferences: 'Save how pages look',
  preferencesSaved: 'Saved.',
  passwordHeading: 'Password',
  currentPassword: 'Present password',
  newPassword: 'New password',
  newPasswordHint:
    'At least 8 characters; 15 or more are better. A sentence you can remember is a good one. Pasting works.',
  changePassword: 'Change password',
  passwordChanged: 'The password is changed. Your other sessions have ended.',
  firstHeading: 'Choose a password of your own',
  firstSentence:
    'The one you signed in with is temporary: somebody else has seen it. Nothing else opens before it is changed.',
  sessionsHeading: 'Where you are signed in',
  sessionsSentence: 'End a session that you don’t know, then change your password.',
  session: 'Browser',
  unknownAgent: 'unknown browser',
  thisSession: 'this one',
  signedInAt: 'Signed in',
  lastSeen: 'Last seen',
  endSession: 'Sign out there',
  endSessionOf: (agent: string) => `Sign out there: ${agent}`,
  sessionEnded: 'Signed out there.',
  sessionsNoun: ['session', 'sessions'],
  act: 'Act',
} as const;

export const accountProblems: ProblemSentences = {
  password_wrong: 'The present password is not right. Nothing was changed.',
  password_tries_spent: ({ minutes }) =>
    `The password was wrong too often. Wait ${counted(Number(minutes), 'minute', 'minutes')}, then try again.`,
  password_common: 'This password stands on lists that attackers try first. Choose another.',
  password_same: 'The new password is the old one. Choose another.',
  password_personal: 'The password holds your name or address. Choose another.',
};
