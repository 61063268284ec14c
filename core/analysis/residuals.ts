import { dealResiduals } from '../independence/permutation.ts';
import type { LongTable } from '../table/long-table.ts';
import { type MeanModel, meanModelOf } from './mean-model.ts';

/** One used reading beside the line: `response` = `fitted` + `residual`, in units of the response. */
export interface Residual {
  readonly subject: string;
  readonly time: number;
  readonly residual: number;
  readonly fitted: number;
  readonly response: number;
  /** Only where a group is in use. */
  readonly group?: string;
  /** Position of the reading in the long table. */
  readonly row: number;
}

/** `dealt` are residuals in another order; without them each reading has its own. */
function listResiduals({ table, fit }: MeanModel, dealt: Float64Array | null): Residual[] {
  const list: Residual[] = [];
  table.subjects.forEach((subject, i) => {
    const group = table.levels?.[table.level?.[i] ?? 0];
    for (let r = table.start[i]!; r < table.start[i + 1]!; r++) {
      const own = table.response[r]!;
      const fitted = own - fit.residuals[r]!;
      const residual = dealt ? dealt[r]! : fit.residuals[r]!;
      const response = dealt ? fitted + residual : own;
      const base = { subject, time: table.time[r]!, residual, fitted, response };
      list.push({ ...base, ...(group === undefined ? {} : { group }), row: table.row[r]! });
    }
  });
  return list;
}

/**
 * The least-squares residuals of the model of the mean (time, or time × group), subjects in order of first
 * appearance, readings by time within subject.
 *
 * @throws StatsError as `analyse` does
 */
export function residualsOf(table: LongTable): Residual[] {
  const model = meanModelOf(table);
  return listResiduals(model, null);
}

/**
 * The dealt twin: the same residuals dealt at random over all readings, so that every subject keeps its number of
 * readings and its times. `response` is what the reading would have been.
 *
 * @throws StatsError as `analyse` does
 */
export function dealtTwin(table: LongTable, seed: number): Residual[] {
  const model = meanModelOf(table);
  return listResiduals(model, dealResiduals(model.fit.residuals, seed));
}
