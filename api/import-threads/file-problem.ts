import type { FileProblemCode } from '../words/imports.ts';

/**
 * What is wrong with a whole file. Rows have reasons of their own; a file problem means that the rows
 * can't be told apart, so nothing of the file is read.
 */
export type { FileProblemCode };
export type Params = Record<string, string | number>;

export class FileProblem extends Error {
  readonly code: FileProblemCode;
  readonly params: Params;

  constructor(code: FileProblemCode, params: Params = {}) {
    super(code);
    this.name = 'FileProblem';
    this.code = code;
    this.params = params;
  }
}
