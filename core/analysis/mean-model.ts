import { type ClusterBasis, clusterBasis } from '../cluster/cluster-basis.ts';
import { StatsError } from '../errors.ts';
import { timeDesign } from '../linear/design.ts';
import { coefficientDirections, fitOls, type OlsFit } from '../linear/fit-ols.ts';
import { groupBySubject } from '../table/group-by-subject.ts';
import type { GroupedTable, LongTable } from '../table/long-table.ts';
import { type Structure, structureOf } from '../table/structure.ts';

/** The readings and the model of their mean, response ~ time or response ~ time × group, on which all parts rest. */
export interface MeanModel {
  readonly table: GroupedTable;
  readonly structure: Structure;
  readonly fit: OlsFit;
  readonly basis: ClusterBasis;
  /** p directions h, one a coefficient in the order of `fit.names`. */
  readonly directions: readonly Float64Array[];
}

/** Groups the readings and refuses what no line can be fitted to. */
export function usableReadings(long: LongTable): GroupedTable {
  const table = groupBySubject(long);
  if (table.subjects.length < 2) {
    throw new StatsError('too_few_subjects', { subject: table.subjects[0]! });
  }
  return table;
}

/**
 * Fits the model of the mean by least squares and gathers what cluster-robust errors need.
 *
 * @throws StatsError too_few_times, too_few_readings, collinear
 */
export function fitMeanModel(table: GroupedTable, structure: Structure): MeanModel {
  const fit = fitOls(timeDesign(table), table.response);
  return {
    table,
    structure,
    fit,
    basis: clusterBasis(fit, table.start),
    directions: coefficientDirections(fit),
  };
}

/** The model of the mean straight from a long table. */
export function meanModelOf(long: LongTable): MeanModel {
  const table = usableReadings(long);
  return fitMeanModel(table, structureOf(table));
}
