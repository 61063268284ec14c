/** Passwords: hashing, comparing in equal time, and what a new one has to be. */
import { randomBytes, randomInt } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';
import { Problem } from '../http/problems.ts';
import { isCommonPassword } from './common-passwords.ts';

/** OWASP's floor for argon2id, which the library takes unless told otherwise: 19 MiB, two passes, one lane. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

let dummy: Promise<string> | undefined;

export function hashPassword(password: string): Promise<string> {
  return hash(normal(password), COST);
}

/**
 * @param passwordHash undefined where there is no account: the same work is done, and the answer is no,
 *   so that the time taken does not tell which addresses have accounts
 */
export async function passwordMatches(
  passwordHash: string | undefined,
  password: string,
): Promise<boolean> {
  if (passwordHash !== undefined) return verify(passwordHash, normal(password));
  dummy ??= hash(randomBytes(24), COST);
  await verify(await dummy, normal(password));
  return false;
}

/** The same password typed on two keyboards may be two spellings in Unicode. */
function normal(password: string): string {
  return password.normalize('NFKC');
}

/** @throws Problem where the password is on the common list, or made of the person's own name or address */
export function refuseWeakPassword(
  password: string,
  person: { email: string; name: string },
  field = 'newPassword',
): void {
  const plain = normal(password).toLowerCase();
  const refuse = (code: 'password_common' | 'password_personal') => {
    throw new Problem(code, {}, { errors: [{ path: field, message: '' }] });
  };
  if (isCommonPassword(plain)) refuse('password_common');
  const own = [
    person.email,
    person.email.split('@', 1)[0] ?? '',
    ...person.name.split(/\s+/),
    person.name.replace(/\s+/g, ''),
  ].map((part) => part.toLowerCase());
  // What is left beside the own name has to be a password by itself.
  const longest = own
    .filter((part) => part.length >= 4 && plain.includes(part))
    .sort((a, b) => b.length - a.length)[0];
  if (longest && plain.length - longest.length < 8) refuse('password_personal');
}

/** Letters and digits that can't be taken for one another when read aloud or copied from paper. */
const CLEAR = 'abcdefghjkmnpqrstuvwxyz23456789';

/** Twenty letters in groups of five, about 99 bits. */
export function temporaryPassword(): string {
  const letters = Array.from({ length: 20 }, () => CLEAR[randomInt(CLEAR.length)]);
  return [0, 5, 10, 15].map((start) => letters.slice(start, start + 5).join('')).join('-');
}
