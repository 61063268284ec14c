/** Sentences for the codes of problem documents. A feature's own codes stand in its own word file. */
export type ProblemParams = Readonly<Record<string, string | number>>;
export type ProblemSentences = Readonly<Record<string, (params: ProblemParams) => string>>;
