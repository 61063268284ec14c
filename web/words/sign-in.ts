/** The sign-in page, and what stands on it beside the form. */
import { counted } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

export const signInWords = {
  heading: 'Sign in to Tetherline',
  sentence:
    'Readings of one subject belong together. Here they stay together, from entry to analysis.',
  email: 'E-mail',
  password: 'Password',
  act: 'Sign in',
  working: 'Signing in',
  why: {
    out: 'You have signed out. Nothing of the study is kept on this device.',
    idle: 'You were signed out after 20 minutes without a touch. What was saved is kept.',
    ended: 'Your session has ended. Sign in again to go on.',
    elsewhere: 'You were signed out in another window.',
    password: 'Your password is changed. Sign in with the new one.',
  },
  forgotten: 'Password lost? Ask the administrator of this installation for a new one.',
  cautionsHeading: 'Before you rely on it',
  cautions: [
    'Tetherline is not a medical device and gives no diagnosis or treatment advice.',
    'Urgent findings go by the protocol’s own reporting line, not by this tool.',
    'It supports and does not replace the protocol, the analysis plan, the charter and those licensed to decide.',
    'Demo data are invented. Never enter real participants in the demo.',
  ],
} as const;

export const signInProblems: ProblemSentences = {
  not_signed_in: 'Sign in, then try again.',
  session_ended: 'Your session has ended. Sign in again.',
  sign_in_refused:
    'Address and password do not belong together, or the account is not open. Check both; capital letters count.',
  sign_in_throttled: ({ minutes }) =>
    `Too many tries. Wait ${counted(Number(minutes), 'minute', 'minutes')}, then try again.`,
};
