/** A refusal by the API, said in the words of our own catalogue. */
import type { z } from 'zod';
import { problemSchema } from '../../api/contracts/problem.ts';
import { problems, words } from '../words/en.ts';
import { fillSentence, type ProblemParams } from '../words/problems.ts';

/** As far as it can be read: a proxy may answer in the server's place. */
const documentSchema = problemSchema.partial();

type Facts = {
  status: number;
  code: string;
  params?: ProblemParams;
  /** An empty message stands for the sentence of the refusal. */
  errors?: readonly { path: string; message: string }[];
  requestId?: string | null;
};

export class ApiProblem extends Error {
  readonly status: number;
  readonly code: string;
  readonly params: ProblemParams;
  readonly errors: readonly { path: string; message: string }[];
  /** The number that support can find this request by. */
  readonly requestId: string | null;

  constructor(facts: Facts, options?: ErrorOptions) {
    super(sentenceFor(facts.code, facts.params ?? {}, facts.status), options);
    this.name = 'ApiProblem';
    this.status = facts.status;
    this.code = facts.code;
    this.params = facts.params ?? {};
    this.errors = (facts.errors ?? []).map(({ path, message }) => ({
      path,
      message: message || this.message,
    }));
    this.requestId = facts.requestId ?? null;
  }
}

function sentenceFor(code: string, params: ProblemParams, status: number): string {
  const sentence = problems[code];
  if (sentence) return fillSentence(sentence, params);
  if (status === 401) return words.states.signedOut;
  if (status === 403) return words.states.forbidden;
  if (status === 404) return words.states.notFound;
  return words.states.failed;
}

/** Reads the problem document of a refused response. */
export async function problemFrom(response: Response): Promise<ApiProblem> {
  const text = await response.text();
  let facts: z.infer<typeof documentSchema> = {};
  if ((response.headers.get('content-type') ?? '').includes('json')) {
    const read = documentSchema.safeParse(parseJson(text));
    if (read.success) facts = read.data;
  }
  return new ApiProblem({
    status: response.status,
    code: facts.code ?? `status_${response.status}`,
    params: facts.params,
    // Where an entry only repeats the server's sentence, the catalogue has a better one for it.
    errors: facts.errors?.map(({ path, message }) => ({
      path,
      message: message === facts.detail ? '' : message,
    })),
    requestId: facts.requestId ?? response.headers.get('x-request-id'),
  });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    // A proxy may answer with a page of its own; the status still says what happened.
    return { detail: String(error) };
  }
}

/** The sentence of anything that was thrown. */
export function sentenceOf(error: unknown): string {
  return error instanceof ApiProblem ? error.message : words.states.failed;
}
