/** Refusals around signing in, sessions and passwords. */
import { defineProblems } from './problem-words.ts';

export const authProblems = defineProblems({
  not_signed_in: {
    status: 401,
    title: 'Sign in first',
    detail: 'Sign in, then try again.',
  },
  session_ended: {
    status: 401,
    title: 'Signed out',
    detail: 'Your session has ended ({why}). Sign in again.',
  },
  // One sentence for an unknown address, a wrong password and a disabled account.
  sign_in_refused: {
    status: 401,
    title: 'Not signed in',
    detail: 'Address and password do not belong together, or the account is not open.',
  },
  sign_in_throttled: {
    status: 429,
    title: 'Too many tries',
    detail: 'Too many tries. Wait {minutes} minutes, then try again.',
  },
  password_wrong: {
    status: 403,
    title: 'Wrong password',
    detail: 'The password is not right. Nothing was changed.',
  },
  password_tries_spent: {
    status: 429,
    title: 'Too many tries',
    detail: 'The password was wrong too often. Wait {minutes} minutes, then try again.',
  },
  password_common: {
    status: 422,
    title: 'Password too common',
    detail: 'This password stands on lists that attackers try first. Choose another.',
  },
  password_same: {
    status: 422,
    title: 'Same password',
    detail: 'The new password is the old one. Choose another.',
  },
  password_personal: {
    status: 422,
    title: 'Password too close to you',
    detail: 'The password holds your name or address. Choose another.',
  },
});
