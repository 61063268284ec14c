/** Refusals of the engine as problem documents. */
import type { Refused } from '../../analysis-threads/jobs.ts';
import { Problem } from '../../http/problems.ts';
import { analysisProblems } from '../../words/analysis.ts';

/**
 * A cut that the engine can't take is the reader's to mend; a code without words is a mistake of ours,
 * since a cut holds finite numbers and equal columns.
 */
export function engineProblem(refused: Refused): Error {
  const code = `engine_${refused.code}`;
  return isProblem(code)
    ? new Problem(code, refused.params)
    : new Error(`the engine refused a cut: ${refused.code} ${JSON.stringify(refused.params)}`);
}

function isProblem(code: string): code is keyof typeof analysisProblems {
  return Object.hasOwn(analysisProblems, code);
}
