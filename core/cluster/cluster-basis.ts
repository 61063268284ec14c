import type { OlsFit } from '../linear/fit-ols.ts';
import { symmetricEigen } from '../linear/symmetric-eigen.ts';

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
  for (let k = 0; k < values.length; k++) {
    const value = values[k]!;
    values[k] = value >= FIXES_A_DIRECTION ? 1 : Math.max(0, value);
  }
  const turned = new Float64Array(count * p);
  for (let i = 0; i < count; i++) {
    for (let k = 0; k < p; k++) {
      let sum = 0;
      for (let a = 0; a < p; a++) sum += vectors[(i * p + a) * p + k]! * c[i * p + a]!;
      turned[i * p + k] = sum;
    }
  }
  return { fit, count, start, s, c, lambda: values, vectors, turned };
}

/** E_i'h (p) of subject i, written into `into`. */
export function turn(basis: ClusterBasis, i: number, h: Float64Array, into: Float64Array): void {
  const { p } = basis.fit;
  for (let k = 0; k < p; k++) {
    let sum = 0;
    for (let a = 0; a < p; a++) sum += basis.vectors[(i * p + a) * p + k]! * h[a]!;
    into[k] = sum;
  }
}

/** The subjects that alone fix a direction the contrast h has a part in; their CR2 error is too small. */
export function subjectsThatFix(basis: ClusterBasis, h: Float64Array): number[] {
  const { p } = basis.fit;
  const along = new Float64Array(p);
  let length = 0;
  for (const x of h) length += x * x;
  const found: number[] = [];
  for (let i = 0; i < basis.count; i++) {
    turn(basis, i, h, along);
    for (let k = 0; k < p; k++) {
      if (basis.lambda[i * p + k] === 1 && along[k]! ** 2 > 1e-8 * length) {
        found.push(i);
        break;
      }
    }
  }
  return found;
}
