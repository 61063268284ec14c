/**
 * What the engine refuses, and what it leaves out. A refusal (`StatsError`) stops the analysis: the input itself
 * must be mended. A `Reason` explains one number that can't be given while the rest can. Both are closed lists of
 * codes with parameters; their English stands in `words/en.ts`.
 */

/** The parameters of each refusal, by its code. `line` counts the lines of the file, the header being 1. */
export interface StatsErrorParameters {
  /** The columns of a table differ in length: a mistake of the calling program. */
  column_lengths: Record<string, never>;
  no_usable_rows: { rows: number };
  too_few_subjects: { subject: string };
  too_few_times: { time: number };
  too_few_readings: { readings: number; parameters: number };
  /** An infinite time or response. */
  infinite_value: { column: 'time' | 'response'; line: number };
  /** Squares of it would overflow, or all of the column is so small that they would vanish. */
  out_of_scale: { column: 'time' | 'response'; line: number; value: number };
  two_levels: { subject: string; first: string; second: string; line: number };
  one_level: { level: string };
  /** A model column that the earlier ones already determine, by its name in the result. */
  collinear: { column: string };
  bad_seed: { value: number };
  bad_draws: { value: number };
  unknown_part: { value: string };
}

export type StatsErrorCode = keyof StatsErrorParameters;

/** A typed refusal of the engine. */
export class StatsError<C extends StatsErrorCode = StatsErrorCode> extends Error {
  override readonly name = 'StatsError';

  constructor(
    readonly code: C,
    readonly parameters: StatsErrorParameters[C],
  ) {
    super(`${code} ${JSON.stringify(parameters)}`);
  }
}

/** Why one number or block is null. */
export type ReasonCode =
  | 'no_repeats'
  | 'no_residual_variance'
  | 'constant_response'
  | 'identical_repeats'
  | 'design_effect_not_positive'
  | 'moulton_not_positive'
  | 'one_time_per_subject'
  | 'too_many_pairs'
  | 'leverage_one'
  | 'fixed_by_subject'
  | 'no_df'
  | 'zero_error'
  | 'unbounded'
  | 'too_few_for_own_error'
  | 'no_own_lines'
  | 'one_own_line'
  | 'no_line_df'
  | 'joint_test_singular'
  | 'two_levels_only'
  | 'too_few_for_split'
  | 'same_mean_times'
  | 'left_out'
  | 'locked'
  | 'open_no_repeats'
  | 'open_acknowledged'
  | 'no_group'
  | 'no_source'
  | 'not_fitted_serial'
  | 'not_fitted_mixed'
  | 'not_fitted_gee'
  | 'not_checked_assumptions';

export interface Reason {
  readonly code: ReasonCode;
  /** Subjects the reason names, where it names any. */
  readonly subjects?: readonly string[];
}

/** A value, or why there is none. */
export type Maybe<T> =
  | { readonly known: true; readonly value: T }
  | { readonly known: false; readonly reason: Reason };

/** Wraps a value that could be given. */
export function known<T>(value: T): Maybe<T> {
  return { known: true, value };
}

/** Wraps the reason why a value can't be given. */
export function notKnown<T = never>(code: ReasonCode, subjects?: readonly string[]): Maybe<T> {
  return { known: false, reason: subjects ? { code, subjects } : { code } };
}
