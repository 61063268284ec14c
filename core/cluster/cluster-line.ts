import { studentQuantile, studentTwoSided } from '../distributions/student-t.ts';
import { dot, shiftAndScale } from '../linear/kernels.ts';
import type { ClusterBasis } from './cluster-basis.ts';
import { subjectsThatFix, turnDirection } from './cluster-basis.ts';
import { type ClusterErrors, clusterErrors } from './sandwich.ts';
import { satterthwaiteDf } from './satterthwaite.ts';

/** One contrast with its cluster-robust errors; df, t, p and limits by CR2 with Satterthwaite df. */
export interface ClusterContrast {
  readonly estimate: number;
  readonly errors: ClusterErrors;
  readonly df: number | null;
  /** Null where the error is 0. */
  readonly t: number | null;
  readonly p: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  /** Subjects (indices) that alone fix a direction this contrast has a part in: its CR2 error is too small. */
  readonly fixedBy: readonly number[];
}

/**
 * The cluster-robust account of the contrast with direction h (p) and value `estimate`.
 *
 * p and limits are left out where a single subject fixes the contrast, as their error would be too small.
 */
export function clusterContrast(
  basis: ClusterBasis,
  h: Float64Array,
  estimate: number,
): ClusterContrast {
  // In unit length, so that the fourth powers inside df stay in range whatever the units of time are.
  const length = Math.sqrt(dot(h, h));
  const along = turnDirection(basis, shiftAndScale(h, 0, 1 / length));
  const errors = clusterErrors(basis, along, length);
  const df = satterthwaiteDf(basis, along);
  const fixedBy = subjectsThatFix(basis, along);
  const exact = !basis.fit.hasVariance;
  const t = exact || !(errors.cr2 > 0) ? null : estimate / errors.cr2;
  const usable = fixedBy.length === 0 && df !== null && (exact || errors.cr2 > 0);
  const reach = usable ? studentQuantile(0.975, df) * errors.cr2 : null;
  return {
    estimate,
    errors,
    df,
    t,
    p: usable && t !== null ? studentTwoSided(t, df) : null,
    lower: reach === null ? null : estimate - reach,
    upper: reach === null ? null : estimate + reach,
    fixedBy,
  };
}
