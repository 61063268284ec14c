/** How a code of a problem document is defined; each noun keeps its own table in this folder. */
export interface ProblemWords {
  /** HTTP status of the refusal. */
  status: number;
  /** Names the kind of problem in a few words. */
  title: string;
  /** What happened and the mend; `{name}` is filled from the parameters. */
  detail: string;
}

/** Keeps the codes as literal keys, so that an unknown code does not compile. */
export function defineProblems<Code extends string>(
  table: Record<Code, ProblemWords>,
): Record<Code, ProblemWords> {
  return table;
}
