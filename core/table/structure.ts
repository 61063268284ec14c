import type { GroupedTable } from './long-table.ts';
import { quantileOfSorted } from './quantile.ts';

/** How the readings hang on their subjects (counts, but for the median and the share). */
export interface Structure {
  readonly subjects: number;
  readonly readings: number;
  readonly subjectsWithRepeats: number;
  readonly repeats: { readonly min: number; readonly median: number; readonly max: number };
  readonly distinctTimes: number;
  /** Readings beyond the first at a time of a subject. */
  readonly replicates: number;
  /** (N − G)/N: readings whose previous one is of the same subject. */
  readonly shareFollowing: number;
}

function countDistinct(values: Float64Array): number {
  const sorted = values.slice().sort();
  let distinct = sorted.length > 0 ? 1 : 0;
  for (let k = 1; k < sorted.length; k++) if (sorted[k] !== sorted[k - 1]) distinct++;
  return distinct;
}

/** Counts the structure of a grouped table. */
export function structureOf(table: GroupedTable): Structure {
  const { start, time } = table;
  const subjects = table.subjects.length;
  const readings = time.length;
  const counts = new Int32Array(subjects);
  let subjectsWithRepeats = 0;
  let replicates = 0;
  for (let i = 0; i < subjects; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    counts[i] = to - from;
    if (to - from > 1) subjectsWithRepeats++;
    for (let k = from + 1; k < to; k++) if (time[k] === time[k - 1]) replicates++;
  }
  counts.sort();
  return {
    subjects,
    readings,
    subjectsWithRepeats,
    repeats: {
      min: counts[0]!,
      median: quantileOfSorted(counts, 0.5),
      max: counts[subjects - 1]!,
    },
    distinctTimes: countDistinct(time),
    replicates,
    shareFollowing: (readings - subjects) / readings,
  };
}
