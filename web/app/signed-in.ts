/**
 * What this device knows about being signed in: that it is, since when nobody has touched it, and
 * how to tell the other tabs. The cookies themselves can't be read by any script.
 */
import { queryClient } from './query-client.ts';

const MARK = 'tetherline.signed-in';
const ACTIVE_AT = 'tetherline.active-at';
const channel = new BroadcastChannel('tetherline');

/** Why somebody stands before the sign-in page. */
export type Why = 'out' | 'idle' | 'ended' | 'elsewhere' | 'password';

export function isMarkedSignedIn(): boolean {
  return localStorage.getItem(MARK) === 'yes';
}

export function markSignedIn(): void {
  localStorage.setItem(MARK, 'yes');
  touch();
}

export function touch(): void {
  localStorage.setItem(ACTIVE_AT, String(Date.now()));
}

export function lastTouched(): number {
  return Number(localStorage.getItem(ACTIVE_AT) ?? 0);
}

/** Forgets every answer of the server, here and in the other tabs. */
export function forgetSignIn(why: Why): void {
  const was = isMarkedSignedIn();
  localStorage.removeItem(MARK);
  queryClient.clear();
  if (was) channel.postMessage(why);
}

/** Told when another tab signed out. */
export function onForgottenElsewhere(listener: (why: Why) => void): () => void {
  const hear = (event: MessageEvent<Why>) => {
    queryClient.clear();
    listener(event.data);
  };
  channel.addEventListener('message', hear);
  return () => channel.removeEventListener('message', hear);
}
