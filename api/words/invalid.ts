/** A sentence for an entry that breaks its contract; a sentence written in the contract itself wins. */
import type { z } from 'zod';

export const NUL_SENTENCE = 'This holds a NUL character. Take it out.';

type Issue = z.core.$ZodRawIssue;

export function sentenceOfIssue(issue: Issue): string {
  if (issue.input === undefined || issue.input === null) return 'Fill this in.';
  switch (issue.code) {
    case 'too_small':
      return tooSmall(issue);
    case 'too_big':
      return issue.origin === 'string' || issue.origin === 'array'
        ? `At most ${issue.maximum} ${issue.origin === 'string' ? 'characters' : 'entries'}.`
        : `At most ${issue.maximum}.`;
    case 'invalid_format':
      return wrongForm(issue.format);
    case 'invalid_value':
      return `Choose one of: ${issue.values.join(', ')}.`;
    case 'invalid_type':
      return `A ${issue.expected} is expected.`;
    case 'unrecognized_keys':
      return `Unknown: ${issue.keys.join(', ')}.`;
    default:
      return 'This entry can’t be used as it stands.';
  }
}

function tooSmall(issue: z.core.$ZodRawIssue<z.core.$ZodIssueTooSmall>): string {
  if (issue.origin === 'string') {
    return Number(issue.minimum) === 1
      ? 'Fill this in.'
      : `Write at least ${issue.minimum} characters.`;
  }
  if (issue.origin === 'array') return `Choose at least ${issue.minimum}.`;
  return `At least ${issue.minimum}.`;
}

function wrongForm(format: string): string {
  if (format === 'email') return 'Write a whole e-mail address, such as name@example.org.';
  if (format === 'date') return 'Write a day that exists, as 2027-03-01.';
  if (format === 'uuid') return 'This is not an id of ours.';
  return 'This entry can’t be used as it stands.';
}
