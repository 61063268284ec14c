import { clusterContrast } from '../cluster/cluster-line.ts';
import { studentQuantile } from '../distributions/student-t.ts';
import { contrastDirection, ordinaryError } from '../linear/fit-ols.ts';
import type { LongTable } from '../table/long-table.ts';
import { type MeanModel, meanModelOf } from './mean-model.ts';

/** The fitted line at one time with its 95 % band. */
export interface BandPoint {
  readonly time: number;
  /** Null without a group. */
  readonly group: string | null;
  readonly estimate: number;
  /** Null where the error is not valid: a single subject fixes the line there, or no df are left. */
  readonly lower: number | null;
  readonly upper: number | null;
  readonly df: number | null;
}

/** The contrast (1, t), or of a group (1, t, 1, t) at its level. */
function contrastAt(model: MeanModel, time: number, level: number): Float64Array {
  const l = new Float64Array(model.fit.p);
  l[0] = 1;
  l[1] = time;
  if (level > 0) {
    const others = (model.table.levels?.length ?? 1) - 1;
    l[1 + level] = 1;
    l[1 + others + level] = time;
  }
  return l;
}

function pointsOf(
  table: LongTable,
  times: readonly number[],
  limits: (
    model: MeanModel,
    h: Float64Array,
    estimate: number,
  ) => Omit<BandPoint, 'time' | 'group'>,
): BandPoint[] {
  const model = meanModelOf(table);
  const groups: (string | null)[] = model.table.levels ? [...model.table.levels] : [null];
  return groups.flatMap((group, level) =>
    times.map((time) => {
      const l = contrastAt(model, time, level);
      let estimate = 0;
      for (let k = 0; k < l.length; k++) estimate += l[k]! * model.fit.beta[k]!;
      return { time, group, ...limits(model, contrastDirection(model.fit, l), estimate) };
    }),
  );
}

/**
 * The pooled line at each time with its CR2 band, each point a contrast with its own Satterthwaite df; with groups
 * one run of points a level, reference first.
 *
 * @param times in the units of the table's times
 * @throws StatsError as `analyse` does
 */
export function pooledBand(table: LongTable, times: readonly number[]): BandPoint[] {
  return pointsOf(table, times, (model, h, estimate) => {
    const { lower, upper, df } = clusterContrast(model.basis, h, estimate);
    return { estimate, lower, upper, df };
  });
}

/**
 * The same line with its ordinary band on N − p df, which takes every reading as independent.
 *
 * @throws StatsError as `analyse` does
 */
export function ordinaryBand(table: LongTable, times: readonly number[]): BandPoint[] {
  return pointsOf(table, times, (model, h, estimate) => {
    const df = model.fit.n - model.fit.p;
    const reach = studentQuantile(0.975, df) * ordinaryError(model.fit, h);
    return { estimate, lower: estimate - reach, upper: estimate + reach, df };
  });
}
