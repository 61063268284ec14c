import { known, type Maybe, notKnown, type ReasonCode } from '../errors.ts';
import { reasonText } from '../words/en.ts';

/** A key that may be null, and the key that then says why. */
export type Nullable<K extends string, T> = { [P in K]: T | null } & {
  [P in `${K}_reason`]?: string;
};

/** `{ name: value }`, or `{ name: null, name_reason: "why" }`. */
export function nullable<K extends string, T>(name: K, value: Maybe<T>): Nullable<K, T> {
  const pair = value.known
    ? { [name]: value.value }
    : { [name]: null, [`${name}_reason`]: reasonText(value.reason) };
  return pair as Nullable<K, T>;
}

/** Wraps a number that lower floors give as null for one reason only. */
export function orReason<T>(
  value: T | null,
  code: ReasonCode,
  subjects?: readonly string[],
): Maybe<T> {
  return value === null ? notKnown(code, subjects) : known(value);
}

/** Several keys that are null for the same reason. */
export function allNull<K extends string>(
  names: readonly K[],
  code: ReasonCode,
): Nullable<K, never> {
  const pairs = names.map((name) => nullable(name, notKnown(code)));
  return Object.assign({}, ...pairs) as Nullable<K, never>;
}
