import type { StatsError, StatsErrorCode, StatsErrorParameters } from '../errors.ts';

/** Where a refusal lies, and what is wrong and how to mend it. */
export interface RefusalText {
  /** "line 12", "column \"time\"", or null where it concerns the whole table. */
  readonly place: string | null;
  readonly text: string;
}

type RefusalWords = {
  [C in StatsErrorCode]: (parameters: StatsErrorParameters[C]) => RefusalText;
};

/** English of every refusal of the engine: what is wrong, then the mend. */
export const refusalWords: RefusalWords = {
  column_lengths: () => ({
    place: null,
    text: 'The columns differ in length. Give every column one value a row.',
  }),
  no_usable_rows: ({ rows }) => ({
    place: null,
    text: `None of the ${rows} rows is complete. Each needs a subject, a time and a response.`,
  }),
  too_few_subjects: ({ subject }) => ({
    place: null,
    text: `All readings are of subject "${subject}". Give readings of two subjects or more.`,
  }),
  too_few_times: ({ time }) => ({
    place: null,
    text: `All readings are at time ${time}. A line needs two different times.`,
  }),
  too_few_readings: ({ readings, parameters }) => ({
    place: null,
    text: `${readings} complete readings can't carry ${parameters} coefficients. Give more readings, or leave the group out.`,
  }),
  infinite_value: ({ column, line }) => ({
    place: `line ${line}`,
    text: `The ${column} is infinite. Write a finite number, or leave the cell empty.`,
  }),
  out_of_scale: ({ column, line, value }) => ({
    place: `line ${line}`,
    text: `The ${column} ${value} is beyond what can be squared. Use another unit.`,
  }),
  two_levels: ({ subject, first, second, line }) => ({
    place: `line ${line}`,
    text: `Subject "${subject}" is in group "${first}" and in group "${second}". Give each subject one group.`,
  }),
  one_level: ({ level }) => ({
    place: null,
    text: `All subjects are in group "${level}". Give two groups or more, or leave the group out.`,
  }),
  collinear: ({ column }) => ({
    place: null,
    text: `The model can't tell "${column}" from its other terms. Give each group readings at two different times, or leave the group out.`,
  }),
  bad_seed: ({ value }) => ({
    place: null,
    text: `The seed ${value} is not a whole number from 0 to 9007199254740991.`,
  }),
  bad_draws: ({ value }) => ({
    place: null,
    text: `The number of draws ${value} is not a whole number from 1 to 1000000.`,
  }),
  unknown_part: ({ value }) => ({
    place: null,
    text: `"${value}" is not a part. The parts are check, ols, lines, cr, wild, lmm, gee, within, assumptions.`,
  }),
};

/** A refusal in English. */
export function refusalText<C extends StatsErrorCode>(error: StatsError<C>): RefusalText {
  return refusalWords[error.code](error.parameters);
}
