/** Keyed fingerprints: equal addresses look equal, and nobody can read an address out of one. */
import { createHmac } from 'node:crypto';
import { isIPv6 } from 'node:net';

export function fingerprint(hashKey: string, kind: 'address' | 'email', value: string): string {
  return createHmac('sha256', hashKey).update(`${kind}\n${value}`).digest('base64url').slice(0, 22);
}

export const emailFingerprint = (hashKey: string, email: string): string =>
  fingerprint(hashKey, 'email', email.trim().toLowerCase());

/** An IPv6 household owns a whole /64, so that is what counts as one address. */
export const addressFingerprint = (hashKey: string, address: string | undefined): string =>
  fingerprint(hashKey, 'address', networkOf(address ?? ''));

function networkOf(address: string): string {
  const bare = address.replace(/^::ffff:(?=\d+\.)/, '');
  if (!isIPv6(bare)) return bare;
  const [head = '', tail] = bare.split('::');
  const left = head ? head.split(':') : [];
  const right = tail ? tail.split(':') : [];
  const zeros = tail === undefined ? 0 : 8 - left.length - right.length;
  const groups = [...left, ...Array<string>(Math.max(0, zeros)).fill('0'), ...right];
  return groups.slice(0, 4).join(':');
}
