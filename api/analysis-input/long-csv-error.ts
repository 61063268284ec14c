import { type CsvParameters, type CsvProblem, csvWords } from '../../core/words/command.ts';

/** Where a problem of a CSV lies. */
export interface CsvPlace {
  /** The file's line, the header being 1. */
  readonly line?: number;
  readonly column?: string;
}

/** A CSV that can't be read as a long table: the code, its place, and in `message` what is wrong and the mend. */
export class LongCsvError<C extends CsvProblem = CsvProblem> extends Error {
  override readonly name = 'LongCsvError';

  constructor(
    readonly code: C,
    readonly place: CsvPlace,
    readonly parameters: CsvParameters<C>,
  ) {
    const words = csvWords[code] as (parameters: CsvParameters<C>) => string;
    super(words(parameters));
  }
}
