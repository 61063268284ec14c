/**
 * How many wrong tries are taken, without letting a stranger lock the person out.
 *
 * Tries from one network address against one account count together, and so do those from one address
 * against any account and those from anywhere against one account. A browser from which the person signed
 * in before carries a mark and has a count of its own, so that a flood from strangers does not reach it.
 * An address without an account is counted like one with.
 */
import type { Limit } from './rate-limit.ts';

const TRIES = 20;
const TRIES_OF_ADDRESS = 100;
const TRIES_OF_ACCOUNT = 200;
const WINDOW_MINUTES = 15;

export function signInLimits(
  emailPrint: string,
  addressPrint: string,
  device: string | null,
): Limit[] {
  const windowMinutes = WINDOW_MINUTES;
  if (device) return [{ key: `sign-in device ${device}`, most: TRIES, windowMinutes }];
  return [
    { key: `sign-in pair ${emailPrint} ${addressPrint}`, most: TRIES, windowMinutes },
    { key: `sign-in address ${addressPrint}`, most: TRIES_OF_ADDRESS, windowMinutes },
    { key: `sign-in account ${emailPrint}`, most: TRIES_OF_ACCOUNT, windowMinutes },
  ];
}

/** Asked again by a signed-in person, to sign a record or to change the password. */
export function passwordAgainLimits(accountUid: string, sessionUid: string): Limit[] {
  return [
    {
      key: `password ${accountUid} ${sessionUid}`,
      most: TRIES,
      windowMinutes: WINDOW_MINUTES,
    },
  ];
}
