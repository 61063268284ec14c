/** Holds what comes in against its contract; a refusal names every entry at fault with its mend. */
import type { Request } from 'express';
import type { z } from 'zod';
import { uidSchema } from '../contracts/common.ts';
import { NUL_SENTENCE, sentenceOfIssue } from '../words/invalid.ts';
import { Problem } from './problems.ts';

/** @throws Problem `not_found` for an id that can't be one of ours: the same words as for an unknown one */
export function checkParams(params: Request['params']): Record<string, string> {
  const checked: Record<string, string> = {};
  for (const [name, value] of Object.entries(params)) {
    const read = uidSchema.safeParse(value);
    if (!read.success) throw new Problem('not_found');
    checked[name] = read.data.toLowerCase();
  }
  return checked;
}

/** @throws Problem `invalid_request` with one entry for each fault */
export function checkAgainst<T>(schema: z.ZodType<T>, value: unknown): T {
  const nul = pathOfNul(value);
  if (nul !== null) {
    throw new Problem('invalid_request', {}, { errors: [{ path: nul, message: NUL_SENTENCE }] });
  }
  const read = schema.safeParse(value, { error: sentenceOfIssue });
  if (read.success) return read.data;
  throw new Problem(
    'invalid_request',
    {},
    {
      errors: read.error.issues.map((issue) => ({
        path: issue.path.map(String).join('.'),
        message: issue.message,
      })),
    },
  );
}

/** PostgreSQL keeps no NUL in a text; the dotted path of the first one, or null. */
function pathOfNul(value: unknown, path: readonly string[] = []): string | null {
  if (typeof value === 'string') return value.includes('\0') ? path.join('.') : null;
  if (typeof value !== 'object' || value === null) return null;
  for (const [name, inner] of Object.entries(value)) {
    const found = pathOfNul(inner, [...path, name]);
    if (found !== null) return found;
  }
  return null;
}

/** @throws Problem `json_expected` where the body came as something else */
export function checkBody<T>(schema: z.ZodType<T>, req: Request): T {
  if (req.body === undefined && !req.is('application/json')) throw new Problem('json_expected');
  return checkAgainst(schema, req.body);
}
