/** English of the server's problem documents, put together from the tables of each noun. */
import { authProblems } from './auth.ts';
import { httpProblems } from './http.ts';
import { importProblems } from './imports.ts';
import { memberProblems } from './members.ts';

export const problemWords = {
  ...httpProblems,
  ...authProblems,
  ...memberProblems,
  ...importProblems,
};

export type ProblemCode = keyof typeof problemWords;
