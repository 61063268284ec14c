/** JSON with one spelling, and its hash: keys in code-unit order at every depth and no white space. */
import { createHash } from 'node:crypto';

export type JsonValue =
  | string
  | number
  | boolean
  | null
  | readonly JsonValue[]
  | { readonly [key: string]: JsonValue | undefined };

/**
 * The canonical text of a value; equal values give equal bytes.
 *
 * Keys whose value is undefined are left out, as `JSON.stringify` does.
 *
 * @throws RangeError for a number that JSON cannot hold, which would otherwise turn into null unseen
 */
export function canonicalJson(value: JsonValue): string {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new RangeError(`JSON cannot hold ${value}`);
  }
  if (value === null || typeof value !== 'object') {
    return JSON.stringify(value);
  }
  if (isList(value)) {
    return `[${value.map(canonicalJson).join(',')}]`;
  }
  const members: string[] = [];
  for (const key of Object.keys(value).sort()) {
    const member = value[key];
    if (member !== undefined) {
      members.push(`${JSON.stringify(key)}:${canonicalJson(member)}`);
    }
  }
  return `{${members.join(',')}}`;
}

function isList(value: object): value is readonly JsonValue[] {
  return Array.isArray(value);
}

/** SHA-256, in lower-case hexadecimal, of the canonical text in UTF-8. */
export function canonicalSha256(value: JsonValue): string {
  return createHash('sha256').update(canonicalJson(value), 'utf8').digest('hex');
}
