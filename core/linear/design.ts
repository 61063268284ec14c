import { Matrix } from 'ml-matrix';
import { StatsError } from '../errors.ts';
import type { GroupedTable } from '../table/long-table.ts';
import { dot, meanOf, shiftAndScale } from './kernels.ts';

/**
 * A model matrix X = X_c M (N × p): X_c has its covariates centred and scaled, M (p × p, upper triangular) brings
 * the coefficients back to the user's scale. The first column is the intercept.
 */
export interface Design {
  readonly names: readonly string[];
  readonly columns: readonly Float64Array[];
  readonly toUser: Matrix;
}

/** A covariate moved to mean 0 and unit root mean square: x = centre + scale · z. */
export interface Scaled {
  readonly z: Float64Array;
  readonly centre: number;
  readonly scale: number;
}

/** Centres and scales a covariate. A constant one keeps scale 1, to be refused as collinear. */
export function standardise(x: Float64Array): Scaled {
  const centre = meanOf(x);
  const moved = shiftAndScale(x, centre, 1);
  const scale = Math.sqrt(dot(moved, moved) / x.length);
  if (!(scale > 0)) return { z: moved, centre, scale: 1 };
  return { z: shiftAndScale(moved, 0, 1 / scale), centre, scale };
}

/** The names of the group's columns: plain with two levels, by level with more. */
export function groupNames(levels: readonly string[]): { group: string[]; byGroup: string[] } {
  if (levels.length === 2) return { group: ['group'], byGroup: ['time_by_group'] };
  const others = levels.slice(1);
  return {
    group: others.map((level) => `group:${level}`),
    byGroup: others.map((level) => `time_by_group:${level}`),
  };
}

/**
 * The model of the mean: intercept and time, or with a group time × group in treatment coding, reference = first
 * level. Order of columns: intercept, time, group levels, their products with time.
 *
 * @throws StatsError too_few_times where all times agree, too_few_readings where N ≤ p
 */
export function timeDesign(table: GroupedTable): Design {
  const n = table.time.length;
  const levels = table.levels ?? [];
  const extra = Math.max(0, levels.length - 1);
  const p = 2 + 2 * extra;
  const first = table.time[0]!;
  if (table.time.every((t) => t === first)) throw new StatsError('too_few_times', { time: first });
  if (n <= p) throw new StatsError('too_few_readings', { readings: n, parameters: p });

  const { z, centre, scale } = standardise(table.time);
  const ones = new Float64Array(n).fill(1);
  const dummies: Float64Array[] = [];
  const products: Float64Array[] = [];
  for (let k = 1; k <= extra; k++) {
    const dummy = new Float64Array(n);
    const product = new Float64Array(n);
    table.subjects.forEach((_, i) => {
      if (table.level?.[i] !== k) return;
      for (let r = table.start[i]!; r < table.start[i + 1]!; r++) {
        dummy[r] = 1;
        product[r] = z[r]!;
      }
    });
    dummies.push(dummy);
    products.push(product);
  }
  const toUser = Matrix.eye(p);
  toUser.set(0, 1, centre);
  toUser.set(1, 1, scale);
  for (let k = 0; k < extra; k++) {
    const column = 2 + extra + k;
    toUser.set(2 + k, column, centre);
    toUser.set(column, column, scale);
  }
  const words = table.levels ? groupNames(table.levels) : { group: [], byGroup: [] };
  return {
    names: ['intercept', 'time', ...words.group, ...words.byGroup],
    columns: [ones, z, ...dummies, ...products],
    toUser,
  };
}

/** A model matrix of an intercept and any named covariates (each N long), centred and scaled. */
export function covariateDesign(covariates: readonly { name: string; x: Float64Array }[]): Design {
  const p = covariates.length + 1;
  const n = covariates[0]?.x.length ?? 0;
  const toUser = Matrix.eye(p);
  const columns: Float64Array[] = [new Float64Array(n).fill(1)];
  covariates.forEach(({ x }, k) => {
    const { z, centre, scale } = standardise(x);
    columns.push(z);
    toUser.set(0, k + 1, centre);
    toUser.set(k + 1, k + 1, scale);
  });
  return { names: ['intercept', ...covariates.map(({ name }) => name)], columns, toUser };
}

/** R of X = QR on the user's scale, from R_c of X_c = Q R_c. */
export function userR(rCentred: Matrix, design: Design): Matrix {
  return rCentred.mmul(design.toUser);
}
