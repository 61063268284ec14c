/** Small dense matrices (p × p, row-major Float64Array), p being the number of model columns. */

/** x with R x = b for upper triangular R (p × p); b is left as it is. */
export function solveUpper(r: Float64Array, b: ArrayLike<number>, p: number): Float64Array {
  const x = new Float64Array(p);
  for (let i = p - 1; i >= 0; i--) {
    let sum = b[i]!;
    for (let j = i + 1; j < p; j++) sum -= r[i * p + j]! * x[j]!;
    x[i] = sum / r[i * p + i]!;
  }
  return x;
}

/** x with R' x = b for upper triangular R (p × p). */
export function solveUpperTransposed(
  r: Float64Array,
  b: ArrayLike<number>,
  p: number,
): Float64Array {
  const x = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    let sum = b[i]!;
    for (let j = 0; j < i; j++) sum -= r[j * p + i]! * x[j]!;
    x[i] = sum / r[i * p + i]!;
  }
  return x;
}

/** The product A B of two p × p matrices. */
export function multiply(a: Float64Array, b: Float64Array, p: number): Float64Array {
  const product = new Float64Array(p * p);
  for (let i = 0; i < p; i++) {
    for (let k = 0; k < p; k++) {
      const factor = a[i * p + k]!;
      if (factor === 0) continue;
      for (let j = 0; j < p; j++) product[i * p + j]! += factor * b[k * p + j]!;
    }
  }
  return product;
}

/**
 * The lower Cholesky factor L of a symmetric positive definite matrix, A = L L'; null where A is not
 * (numerically) positive definite.
 */
export function cholesky(a: Float64Array, p: number): Float64Array | null {
  const l = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    for (let i = j; i < p; i++) {
      let sum = a[i * p + j]!;
      for (let k = 0; k < j; k++) sum -= l[i * p + k]! * l[j * p + k]!;
      if (i === j) {
        if (!(sum > 0)) return null;
        l[i * p + i] = Math.sqrt(sum);
      } else l[i * p + j] = sum / l[j * p + j]!;
    }
  }
  return l;
}

/** x with A x = b, A = L L'. */
export function solveCholesky(l: Float64Array, b: ArrayLike<number>, p: number): Float64Array {
  const x = Float64Array.from(b);
  for (let i = 0; i < p; i++) {
    let sum = x[i]!;
    for (let k = 0; k < i; k++) sum -= l[i * p + k]! * x[k]!;
    x[i] = sum / l[i * p + i]!;
  }
  for (let i = p - 1; i >= 0; i--) {
    let sum = x[i]!;
    for (let k = i + 1; k < p; k++) sum -= l[k * p + i]! * x[k]!;
    x[i] = sum / l[i * p + i]!;
  }
  return x;
}
