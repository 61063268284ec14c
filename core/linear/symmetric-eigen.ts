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

/** One cyclic Jacobi sweep over work (p × p), turning the rows of `vectors` along; returns the off-diagonal mass. */
function sweep(work: Float64Array, vectors: Float64Array, v: number, p: number): number {
  let off = 0;
  for (let i = 0; i < p - 1; i++) {
    for (let j = i + 1; j < p; j++) {
      const b = work[i * p + j]!;
      off += b * b;
      if (b === 0) continue;
      const theta = (work[j * p + j]! - work[i * p + i]!) / (2 * b);
      const t = Math.sign(theta || 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
      const c = 1 / Math.sqrt(t * t + 1);
      const s = t * c;
      for (let k = 0; k < p; k++) {
        const x = work[k * p + i]!;
        const y = work[k * p + j]!;
        work[k * p + i] = c * x - s * y;
        work[k * p + j] = s * x + c * y;
      }
      for (let k = 0; k < p; k++) {
        const x = work[i * p + k]!;
        const y = work[j * p + k]!;
        work[i * p + k] = c * x - s * y;
        work[j * p + k] = s * x + c * y;
      }
      for (let k = 0; k < p; k++) {
        const x = vectors[v + k * p + i]!;
        const y = vectors[v + k * p + j]!;
        vectors[v + k * p + i] = c * x - s * y;
        vectors[v + k * p + j] = s * x + c * y;
      }
    }
  }
  return off;
}

/**
 * Eigenvalues and eigenvectors of `count` symmetric p × p matrices laid one after another in `s` (row-major).
 *
 * Values (count × p, in no order) and vectors (count × p × p, row-major, one eigenvector a column): S = E Λ E'.
 * Closed form for p = 2, cyclic Jacobi else (Golub & Van Loan, Matrix Computations, 8.5).
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
  const work = new Float64Array(p * p);
  for (let i = 0; i < count; i++) {
    const at = i * p * p;
    work.set(s.subarray(at, at + p * p));
    let size = 0;
    for (const x of work) size += x * x;
    for (let k = 0; k < p; k++) vectors[at + k * p + k] = 1;
    for (let round = 0; round < 60; round++) {
      if (sweep(work, vectors, at, p) <= 1e-34 * size) break;
    }
    for (let k = 0; k < p; k++) values[i * p + k] = work[k * p + k]!;
  }
  return { values, vectors };
}
