/** English of the server's problem documents, put together from the tables of each noun. */
import { analysisProblems } from './analysis.ts';
import { authProblems } from './auth.ts';
import { cutProblems } from './cuts.ts';
import { httpProblems } from './http.ts';
import { importProblems } from './imports.ts';
import { memberProblems } from './members.ts';
import { subjectProblems } from './subjects.ts';

export const problemWords = {
  ...httpProblems,
  ...authProblems,
  ...memberProblems,
  ...subjectProblems,
  ...cutProblems,
  ...analysisProblems,
  ...importProblems,
};

export type ProblemCode = keyof typeof problemWords;
