/** Refusals: one table of code, status and title, and the error that carries a code to the caller. */
import type { ProblemDocument } from '../contracts/problem.ts';
import { type ProblemCode, problemWords } from '../words/en.ts';
import type { ProblemWords } from '../words/problem-words.ts';

export type ProblemParams = Readonly<Record<string, string | number>>;
/** `path` names the entry as in the body; an empty message stands for the sentence of the problem. */
export type ProblemEntry = { path: string; message: string };

/** Every code a caller may meet, in the order of the tables. */
export const problemTable: Readonly<Record<ProblemCode, ProblemWords>> = problemWords;
export const problemCodes = Object.keys(problemTable) as ProblemCode[];

interface ProblemOptions extends ErrorOptions {
  /** Which entries are at fault. */
  errors?: readonly ProblemEntry[];
  /** Seconds after which trying again makes sense. */
  retryAfter?: number;
}

/** Thrown anywhere below a route; becomes the problem document of the answer. */
export class Problem extends Error {
  readonly code: ProblemCode;
  readonly params: ProblemParams;
  readonly errors: readonly ProblemEntry[];
  readonly retryAfter: number | undefined;

  constructor(code: ProblemCode, params: ProblemParams = {}, options: ProblemOptions = {}) {
    super(code, options);
    this.name = 'Problem';
    this.code = code;
    this.params = params;
    this.errors = options.errors ?? [];
    this.retryAfter = options.retryAfter;
  }

  get status(): number {
    return problemTable[this.code].status;
  }
}

/** Puts the parameters into `{name}` places; a place without a parameter stays, so that it is seen. */
export function fillSentence(sentence: string, params: ProblemParams): string {
  return sentence.replace(/\{(\w+)\}/g, (place, name: string) => String(params[name] ?? place));
}

export function problemDocument(problem: Problem, requestId: string): ProblemDocument {
  const { status, title, detail } = problemTable[problem.code];
  const sentence = fillSentence(detail, { requestId, ...problem.params });
  return {
    type: `/api/docs#problem-${problem.code}`,
    title,
    status,
    detail: sentence,
    code: problem.code,
    params: { ...problem.params },
    errors: problem.errors.map(({ path, message }) => ({ path, message: message || sentence })),
    requestId,
  };
}
