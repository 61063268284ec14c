/**
 * The catalogue: every visible string of the pages, typed. Each noun keeps its own file;
 * they are put together here and nowhere else.
 */
import {
  chairWord,
  commonProblems,
  commonWords,
  formWords,
  hashWords,
  placeWords,
  progressWords,
  roleWords,
  signingWords,
  stateWords,
  tableWords,
  topBarWords,
} from './common.ts';
import type { ProblemSentences } from './problems.ts';

export const words = {
  common: commonWords,
  topBar: topBarWords,
  roles: roleWords,
  chair: chairWord,
  places: placeWords,
  states: stateWords,
  form: formWords,
  table: tableWords,
  signing: signingWords,
  progress: progressWords,
  hash: hashWords,
} as const;

/** Sentences by the code of a problem document. */
export const problems: ProblemSentences = {
  ...commonProblems,
};
