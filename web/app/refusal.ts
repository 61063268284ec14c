/** A refused form: messages go to their fields, the rest is said over the form. */
import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form';
import { ApiProblem, sentenceOf } from './problem.ts';

/**
 * Puts the errors of a refusal on the fields of `form`.
 * @returns what is to be said over the form; undefined where the fields say all of it.
 */
export function refusalOf<Values extends FieldValues, Output>(
  error: unknown,
  form: UseFormReturn<Values, unknown, Output>,
): string | undefined {
  if (error instanceof ApiProblem) {
    for (const { path, message } of error.errors) {
      // Paths of the server begin with the place, `body.`; fields don't.
      const field = path.replace(/^body\./, '') as FieldPath<Values>;
      form.setError(field, { type: 'server', message });
    }
    if (error.errors.length > 0) return undefined;
  }
  return sentenceOf(error);
}
