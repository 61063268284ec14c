import { analyse } from '../../../core/index.ts';
import type { LongTable } from '../../../core/table/long-table.ts';
import { type ReferenceAnalysis, referenceRows } from './reference.ts';

export type Result = ReturnType<typeof analyse>;
export type Options = Parameters<typeof analyse>[1];

/** One reading: subject, time, response and, where there is one, group. */
export type Row = readonly [subject: string, time: number, response: number, group?: string];

/** A long table of plain rows. */
export function tableOf(rows: readonly Row[]): LongTable {
  const table = {
    subject: rows.map((r) => r[0]),
    time: Float64Array.from(rows, (r) => r[1]),
    response: Float64Array.from(rows, (r) => r[2]),
  };
  return rows[0]?.[3] === undefined ? table : { ...table, group: rows.map((r) => r[3] ?? '') };
}

export function analyseRows(rows: readonly Row[], options: Options = {}): Result {
  return analyse(tableOf(rows), options);
}

/** Reads the rows that a reference analysis names. */
export function rowsOf(folder: string, reference: ReferenceAnalysis): Row[] {
  const { subject, time, response, group } = reference.columns;
  return referenceRows(folder, reference.data).map((r) => {
    const row = [r[subject]!, Number(r[time]), Number(r[response])] as const;
    return group === undefined ? row : [...row, r[group]!];
  });
}

const ACKNOWLEDGE = 'compared with the reference implementation';

/** Runs the engine on a reference analysis, everything unlocked. */
export function analyseReference(
  folder: string,
  reference: ReferenceAnalysis,
  options: Options = {},
): Result {
  return analyseRows(rowsOf(folder, reference), { acknowledge: ACKNOWLEDGE, ...options });
}

/** One coefficient of the pooled line, which must be there. */
export function pooledOf(result: Result, name: string) {
  const { coefficients } = present(result.pooled, 'pooled');
  return present(present(coefficients, 'coefficients')[name], name);
}

/** A block of the result that must be there; its reason is in the failure when it is not. */
export function present<T>(block: T | null | undefined, name: string): T {
  if (block === null || block === undefined) throw new Error(`${name} is missing from the result`);
  return block;
}
