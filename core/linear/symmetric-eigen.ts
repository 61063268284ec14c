import { EigenvalueDecomposition, Matrix } from 'ml-matrix';

/** Two columns in closed form: the angle that makes the off-diagonal element vanish. */
function eigenOfTwo(
  s: Float64Array,
  at: number,
  values: Float64Array,
  vectors: Float64Array,
  to: number,
): void {
  const a = s[at]!;
  const b = s[at + 1]!;
  const d = s[at + 3]!;
  const half = 0.5 * (a - d);
  const radius = Math.sqrt(half * half + b * b);
  const middle = 0.5 * (a + d);
  // The eigenvector of the larger value, taken from the side that does not cancel.
  let x = 1;
  let y = 0;
  if (radius > 0) {
    if (half >= 0) {
      x = half + radius;
      y = b;
    } else {
      x = b;
      y = radius - half;
    }
    const length = Math.sqrt(x * x + y * y);
    x /= length;
    y /= length;
  }
  values[to * 2] = middle + radius;
  values[to * 2 + 1] = middle - radius;
  const v = to * 4;
  vectors[v] = x;
  vectors[v + 1] = -y;
  vectors[v + 2] = y;
  vectors[v + 3] = x;
}

/**
 * Eigenvalues and eigenvectors of `count` symmetric p × p matrices laid one after another in `s` (row-major).
 *
 * Values (count × p, in no order) and vectors (count × p × p, row-major, one eigenvector a column): S = E Λ E'.
 * Closed form for p = 2, which is most fits and spares large ones an object a subject; else by ml-matrix
 * (tridiagonal form and implicit QL).
 */
export function symmetricEigen(
  s: Float64Array,
  count: number,
  p: number,
): { values: Float64Array; vectors: Float64Array } {
  const values = new Float64Array(count * p);
  const vectors = new Float64Array(count * p * p);
  if (p === 2) {
    for (let i = 0; i < count; i++) eigenOfTwo(s, i * 4, values, vectors, i);
    return { values, vectors };
  }
  const matrix = new Matrix(p, p);
  for (let i = 0; i < count; i++) {
    const at = i * p * p;
    for (let a = 0; a < p; a++) {
      for (let b = 0; b < p; b++) matrix.set(a, b, s[at + a * p + b]!);
    }
    const own = new EigenvalueDecomposition(matrix, { assumeSymmetric: true });
    const e = own.eigenvectorMatrix;
    const lambda = own.realEigenvalues;
    for (let a = 0; a < p; a++) {
      values[i * p + a] = lambda[a]!;
      for (let k = 0; k < p; k++) vectors[at + a * p + k] = e.get(a, k);
    }
  }
  return { values, vectors };
}
