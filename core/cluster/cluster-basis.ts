import type { OlsFit } from '../linear/fit-ols.ts';
import { symmetricEigen } from '../linear/symmetric-eigen.ts';

/** Above this leverage a subject's pairs are added one by one where sums of squares would cancel. */
const EXTREME_LEVERAGE = 0.9;

/** An eigenvalue of a subject's leverage from here on counts as one: the subject alone fixes a direction. */
export const FIXES_A_DIRECTION = 1 - 1e-12;

/**
 * All that cluster-robust errors need of the readings, subject by subject, in the orthonormal basis Q of the fit:
 * S_i = Q_i'Q_i = E_i Λ_i E_i' and c_i = Q_i'e_i. H_ii = Q_iQ_i' has S_i's non-zero eigenvalues, so no
 * n_i × n_i matrix is ever formed. Memory O(Gp²), time O(Np² + Gp³).
 */
export interface ClusterBasis {
  readonly fit: OlsFit;
  /** G. */
  readonly count: number;
  /** G + 1 offsets into the readings. */
  readonly start: Int32Array;
  /** G × p × p, row-major. */
  readonly s: Float64Array;
  /** G × p: c_i = Q_i'e_i. */
  readonly c: Float64Array;
  /** G × p: Λ_i, clamped to [0, 1]; exactly 1 where the subject fixes a direction. */
  readonly lambda: Float64Array;
  /** G × p × p, row-major, an eigenvector a column: E_i. */
  readonly vectors: Float64Array;
  /** G × p: E_i'c_i. */
  readonly turned: Float64Array;
  /** G × p: f(λ) of CR2, (1 − λ)^(−½), and 0 where the subject fixes the direction. */
  readonly cr2: Float64Array;
  /** Subjects with an eigenvalue above .9: at most p/.9 of them, as ΣS_i = I. */
  readonly extreme: readonly number[];
  /** Those among them that fix a direction. */
  readonly fixing: readonly number[];
}

function sumsForTwo(fit: OlsFit, start: Int32Array, s: Float64Array, c: Float64Array): void {
  const x = fit.q[0]!;
  const y = fit.q[1]!;
  const e = fit.residuals;
  const count = start.length - 1;
  for (let i = 0; i < count; i++) {
    let xx = 0;
    let xy = 0;
    let yy = 0;
    let xe = 0;
    let ye = 0;
    for (let r = start[i]!; r < start[i + 1]!; r++) {
      const a = x[r]!;
      const b = y[r]!;
      const residual = e[r]!;
      xx += a * a;
      xy += a * b;
      yy += b * b;
      xe += a * residual;
      ye += b * residual;
    }
    s[i * 4] = xx;
    s[i * 4 + 1] = xy;
    s[i * 4 + 2] = xy;
    s[i * 4 + 3] = yy;
    c[i * 2] = xe;
    c[i * 2 + 1] = ye;
  }
}

function sumsForAny(fit: OlsFit, start: Int32Array, s: Float64Array, c: Float64Array): void {
  const { q, p, residuals } = fit;
  const count = start.length - 1;
  for (let i = 0; i < count; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    for (let a = 0; a < p; a++) {
      const left = q[a]!;
      for (let b = a; b < p; b++) {
        const right = q[b]!;
        let sum = 0;
        for (let r = from; r < to; r++) sum += left[r]! * right[r]!;
        s[(i * p + a) * p + b] = sum;
        s[(i * p + b) * p + a] = sum;
      }
      let along = 0;
      for (let r = from; r < to; r++) along += left[r]! * residuals[r]!;
      c[i * p + a] = along;
    }
  }
}

/** Gathers the basis of a fit in one pass over the readings; `start` holds the G + 1 offsets of the subjects. */
export function clusterBasis(fit: OlsFit, start: Int32Array): ClusterBasis {
  const { p } = fit;
  const count = start.length - 1;
  const s = new Float64Array(count * p * p);
  const c = new Float64Array(count * p);
  if (p === 2) sumsForTwo(fit, start, s, c);
  else sumsForAny(fit, start, s, c);
  const { values, vectors } = symmetricEigen(s, count, p);
  const cr2 = new Float64Array(count * p);
  const extreme = new Set<number>();
  const fixing = new Set<number>();
  for (let at = 0; at < values.length; at++) {
    const value = values[at]!;
    if (value < 0) values[at] = 0;
    if (value > EXTREME_LEVERAGE) extreme.add(Math.floor(at / p));
    if (value >= FIXES_A_DIRECTION) {
      values[at] = 1;
      fixing.add(Math.floor(at / p));
    } else cr2[at] = value > 0 ? 1 / Math.sqrt(1 - value) : 1;
  }
  return {
    fit,
    count,
    start,
    s,
    c,
    lambda: values,
    vectors,
    turned: turnAll(vectors, count, p, c, p),
    cr2,
    extreme: [...extreme],
    fixing: [...fixing],
  };
}

/** E_i'x_i of every subject (G × p); x_i (p) stands at x[i · stride]. */
function turnAll(
  vectors: Float64Array,
  count: number,
  p: number,
  x: Float64Array,
  stride: number,
): Float64Array {
  const turned = new Float64Array(count * p);
  if (p === 2) {
    // The two eigenvectors are one turn apart, so half of the reads do.
    for (let i = 0; i < count; i++) {
      const cosine = vectors[4 * i]!;
      const sine = vectors[4 * i + 2]!;
      const a = x[i * stride]!;
      const b = x[i * stride + 1]!;
      turned[2 * i] = cosine * a + sine * b;
      turned[2 * i + 1] = cosine * b - sine * a;
    }
    return turned;
  }
  for (let i = 0; i < count; i++) {
    for (let k = 0; k < p; k++) {
      let sum = 0;
      for (let a = 0; a < p; a++) sum += vectors[(i * p + a) * p + k]! * x[i * stride + a]!;
      turned[i * p + k] = sum;
    }
  }
  return turned;
}

/** E_i'h of every subject (G × p), for the direction h (p) of a contrast. */
export function turnDirection(basis: ClusterBasis, h: Float64Array): Float64Array {
  return turnAll(basis.vectors, basis.count, basis.fit.p, h, 0);
}

/**
 * The subjects that alone fix a direction the contrast has a part in; its CR2 error is too small. `along` is the
 * contrast's `turnDirection`.
 */
export function subjectsThatFix(basis: ClusterBasis, along: Float64Array): number[] {
  const { p } = basis.fit;
  return basis.fixing.filter((i) => {
    let length = 0;
    for (let k = 0; k < p; k++) length += along[i * p + k]! ** 2;
    for (let k = 0; k < p; k++) {
      const at = i * p + k;
      if (basis.lambda[at] === 1 && along[at]! ** 2 > 1e-8 * length) return true;
    }
    return false;
  });
}
