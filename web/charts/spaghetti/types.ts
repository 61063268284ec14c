/** What the spaghetti plot draws; times on one axis and in one unit. */
export type PathReading = { time: number; value: number; visit: string };

export type OwnLine = { intercept: number; slope: number; n: number };

export type SpaghettiSubject = {
  id: string;
  code: string;
  group: string | null;
  readings: readonly PathReading[];
  ended: { word: string; time: number | null } | null;
  /** Null where no line could be fitted to this subject alone. */
  own: OwnLine | null;
};

export type BandPoint = {
  time: number;
  estimate: number;
  lower: number | null;
  upper: number | null;
  /** Subjects with a reading at or after this time. */
  remaining: number;
};

export type PooledLine = { group: string | null; points: readonly BandPoint[] };

export type SpaghettiData = {
  subjects: readonly SpaghettiSubject[];
  visits: readonly { name: string; time: number; n: number }[];
  lines: readonly PooledLine[];
  /** "sway path" */
  measure: string;
  unit: string | null;
  /** Counts and shares are drawn from zero. */
  fromZero: boolean;
  /** "weeks since baseline" */
  timeName: string;
  /** "a week", for slopes */
  per: string;
  /** "pooled line" or "ordinary straight line" */
  lineName: string;
};

export type DrawAs = 'readings' | 'own lines';
export type DrawMany = 'ribbons' | 'every path';

/** Past this many subjects, paths hide each other and ribbons say more. */
export const MANY_SUBJECTS = 400;
/** Past this many readings, SVG grows slow and a canvas draws the paths. */
export const MANY_MARKS = 5000;
/** Fewer subjects than this carry no line worth full strength. */
export const FEW_SUBJECTS = 5;
