/** Readings as they come, one row a reading, in file order; all columns have the same length. */
export interface LongTable {
  /** Subject codes, text as written; '' is missing. */
  readonly subject: readonly string[];
  /** Times on the user's scale; NaN is missing. */
  readonly time: Float64Array;
  /** Responses; NaN is missing. */
  readonly response: Float64Array;
  /** Group of the row's subject, text as written; '' is missing. Left out when no group is in use. */
  readonly group?: readonly string[];
  /** The line of the file each row stands on; without it row k stands on line k + 2, below a header. */
  readonly line?: Int32Array;
}

/** Why a row is not used, in the order in which they are looked for. */
export type DropReason = 'no_subject' | 'no_time' | 'no_response' | 'no_group';

export interface DroppedRow {
  readonly line: number;
  readonly reason: DropReason;
}

/**
 * The used readings by subject: subjects in order of first appearance, readings by time within subject, equal
 * times in file order. Reading r of subject i stands at positions start[i] … start[i + 1] − 1 of the N-long columns.
 */
export interface GroupedTable {
  /** Rows of the long table, used or not. */
  readonly rows: number;
  readonly dropped: readonly DroppedRow[];
  /** G subject codes. */
  readonly subjects: readonly string[];
  /** G + 1 offsets. */
  readonly start: Int32Array;
  /** N times, rising within subject. */
  readonly time: Float64Array;
  /** N responses. */
  readonly response: Float64Array;
  /** Levels of the group in plain code-unit order, the first is the reference; null without a group. */
  readonly levels: readonly string[] | null;
  /** G indices into `levels`; null without a group. */
  readonly level: Int32Array | null;
  /** N positions in the long table. */
  readonly row: Int32Array;
}
