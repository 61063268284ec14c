/** The end of every refused request: one problem document, and a log line only where we are at fault. */
import type { ErrorRequestHandler, Response } from 'express';
import type { Logger } from 'pino';
import { Problem, problemDocument } from './problems.ts';
import { requestIdOf } from './request-facts.ts';

/** PostgreSQL: serialization failure, deadlock, and its own shutdown. */
const PASSING_STATES = new Set(['40001', '40P01', '57P01', '57P03']);

interface Foreign {
  type?: string;
  status?: number;
  code?: string;
  driverError?: { code?: string };
}

/** Sorts what other libraries throw into the problems of our table. */
export function asProblem(error: unknown): Problem {
  if (error instanceof Problem) return error;
  const foreign = (error ?? {}) as Foreign;
  if (foreign.type === 'entity.too.large') return new Problem('body_too_large');
  if (foreign.type === 'entity.parse.failed') return new Problem('malformed_json');
  if (PASSING_STATES.has(foreign.driverError?.code ?? foreign.code ?? '')) {
    return new Problem('busy', {}, { cause: error, retryAfter: 1 });
  }
  // Class 22 is a value that a column can't hold, such as a number past its range: it came with the request.
  if (foreign.driverError?.code?.startsWith('22')) {
    return new Problem('malformed_request', {}, { cause: error });
  }
  const status = foreign.status ?? 500;
  if (status >= 400 && status < 500) return new Problem('malformed_request', {}, { cause: error });
  return new Problem('failed', {}, { cause: error });
}

export function sendProblem(res: Response, problem: Problem): void {
  const document = problemDocument(problem, requestIdOf(res));
  if (problem.retryAfter !== undefined) res.set('Retry-After', String(problem.retryAfter));
  res.status(document.status).type('application/problem+json').send(JSON.stringify(document));
}

export function errorHandler(logger: Logger): ErrorRequestHandler {
  return (error, _req, res, next) => {
    const problem = asProblem(error);
    if (problem.status >= 500) {
      logger.error({ requestId: requestIdOf(res), fault: faultOf(error) }, 'request failed');
    }
    // A stream that has begun can only be cut off; Express does that.
    if (res.headersSent) next(error);
    else sendProblem(res, problem);
  };
}

/** What of an error may be logged: parameters and details of a query hold readings, so they stay out. */
function faultOf(error: unknown): Record<string, string | undefined> {
  if (!(error instanceof Error)) return { kind: typeof error };
  const { code, driverError } = error as Error & Foreign;
  return {
    kind: error.name,
    code: driverError?.code ?? code,
    // A message of PostgreSQL may quote a value; its code and our own stack tell enough.
    message: driverError ? undefined : error.message,
    stack: error.stack
      ?.split('\n')
      .filter((line) => line.trimStart().startsWith('at '))
      .slice(0, 12)
      .join('\n'),
  };
}
