import type { Matrix } from 'ml-matrix';

/**
 * Substitution in the R of a QR. ml-matrix solves general systems by LU with row exchanges, which in R' would let a
 * column in large units decide the pivots; substitution is exact row by row whatever the units.
 */

/** x (p) with R x = b for upper triangular R (p × p); b is left as it is. */
export function solveUpper(r: Matrix, b: ArrayLike<number>): Float64Array {
  const p = r.rows;
  const x = new Float64Array(p);
  for (let i = p - 1; i >= 0; i--) {
    let sum = b[i]!;
    for (let j = i + 1; j < p; j++) sum -= r.get(i, j) * x[j]!;
    x[i] = sum / r.get(i, i);
  }
  return x;
}

/** x (p) with R' x = b for upper triangular R (p × p). */
export function solveUpperTransposed(r: Matrix, b: ArrayLike<number>): Float64Array {
  const p = r.rows;
  const x = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    let sum = b[i]!;
    for (let j = 0; j < i; j++) sum -= r.get(j, i) * x[j]!;
    x[i] = sum / r.get(i, i);
  }
  return x;
}
