/** The set-up of a study, read only. */
import type { ProblemSentences } from './problems.ts';

export const setupWords = {
  heading: 'Set-up',
} as const;

export const setupProblems: ProblemSentences = {};
