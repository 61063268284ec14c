/** Sentences for the codes of problem documents. A feature's own codes stand in its own word file. */
export type ProblemParams = Readonly<Record<string, string | number>>;

/** A sentence whose `{name}` places are filled from the parameters, or one that is made from them. */
export type ProblemSentences = Readonly<
  Record<string, string | ((params: ProblemParams) => string)>
>;

/** Fills a sentence; a place without a parameter stays, so that it is seen. */
export function fillSentence(
  sentence: string | ((params: ProblemParams) => string),
  params: ProblemParams,
): string {
  if (typeof sentence === 'function') return sentence(params);
  return sentence.replace(/\{(\w+)\}/g, (place, name: string) => String(params[name] ?? place));
}
