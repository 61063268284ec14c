import { CholeskyDecomposition, EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { fUpper } from '../distributions/f.ts';
import { dot, shiftAndScale } from '../linear/kernels.ts';
import { type ClusterBasis, turnDirection } from './cluster-basis.ts';

/** A small-sample F test of several contrasts at once. */
export interface JointTest {
  readonly f: number;
  readonly df1: number;
  readonly df2: number;
  readonly p: number;
}

interface Parts {
  /** ΣP_i (m × m). */
  readonly omega: Matrix;
  /** G × m × m. */
  readonly own: Float64Array;
  /** G × m × p: u_is = S_iB_iH_C e_s. */
  readonly u: Float64Array;
}

/** f(Λ_i)E_i'h of every subject (G × p), one array a direction. */
function weightedDirections(
  basis: ClusterBasis,
  directions: readonly Float64Array[],
): Float64Array[] {
  return directions.map((h) => {
    const along = turnDirection(basis, h);
    for (let at = 0; at < along.length; at++) along[at]! *= basis.cr2[at]!;
    return along;
  });
}

/** P_i and u_is for the directions h_1 … h_m. */
function partsOf(basis: ClusterBasis, directions: readonly Float64Array[]): Parts {
  const { p } = basis.fit;
  const m = directions.length;
  const omega = new Matrix(m, m);
  const own = new Float64Array(basis.count * m * m);
  const u = new Float64Array(basis.count * m * p);
  const weighted = weightedDirections(basis, directions);
  for (let i = 0; i < basis.count; i++) {
    weighted.forEach((along, s) => {
      for (let a = 0; a < p; a++) {
        let sum = 0;
        for (let k = 0; k < p; k++) {
          sum += basis.vectors[(i * p + a) * p + k]! * basis.lambda[i * p + k]! * along[i * p + k]!;
        }
        u[(i * m + s) * p + a] = sum;
      }
    });
    for (let s = 0; s < m; s++) {
      for (let t = 0; t < m; t++) {
        let sum = 0;
        for (let k = 0; k < p; k++) {
          const at = i * p + k;
          const lambda = basis.lambda[at]!;
          sum += lambda * (1 - lambda) * weighted[s]![at]! * weighted[t]![at]!;
        }
        own[(i * m + s) * m + t] = sum;
        omega.set(s, t, omega.get(s, t) + sum);
      }
    }
  }
  return { omega, own, u };
}

/** Σ over s, t of (u_is'u_js)(u_it'u_jt) + (u_it'u_js)(u_jt'u_is), for one ordered pair of subjects. */
function pairTerm(u: Float64Array, i: number, j: number, m: number, p: number): number {
  const cross = new Float64Array(m * m);
  for (let s = 0; s < m; s++) {
    for (let t = 0; t < m; t++) {
      let sum = 0;
      for (let a = 0; a < p; a++) sum += u[(i * m + s) * p + a]! * u[(j * m + t) * p + a]!;
      cross[s * m + t] = sum;
    }
  }
  let total = 0;
  for (let s = 0; s < m; s++) {
    for (let t = 0; t < m; t++) {
      total += cross[s * m + s]! * cross[t * m + t]! + cross[t * m + s]! * cross[s * m + t]!;
    }
  }
  return total;
}

/** T of the HTZ test; pairs with an extreme subject are added one by one, the rest by ‖W‖² and tr(W²). */
function spread(basis: ClusterBasis, parts: Parts, m: number): number {
  const { p } = basis.fit;
  const { extreme } = basis;
  const isExtreme = new Set(extreme);
  const w = new Float64Array(m * m * p * p);
  let total = 0;
  for (let i = 0; i < basis.count; i++) {
    for (let s = 0; s < m; s++) {
      for (let t = 0; t < m; t++) {
        const at = i * m * m;
        const cross = parts.own[at + s * m + t]!;
        total += parts.own[at + s * m + s]! * parts.own[at + t * m + t]! + cross * cross;
      }
    }
    if (isExtreme.has(i)) continue;
    total -= pairTerm(parts.u, i, i, m, p);
    for (let s = 0; s < m; s++) {
      for (let t = 0; t < m; t++) {
        for (let a = 0; a < p; a++) {
          const left = parts.u[(i * m + s) * p + a]!;
          for (let b = 0; b < p; b++) {
            w[((s * m + t) * p + a) * p + b]! += left * parts.u[(i * m + t) * p + b]!;
          }
        }
      }
    }
  }
  for (let block = 0; block < m * m; block++) {
    for (let a = 0; a < p; a++) {
      for (let b = 0; b < p; b++) {
        const x = w[(block * p + a) * p + b]!;
        total += x * x + x * w[(block * p + b) * p + a]!;
      }
    }
  }
  for (const i of extreme) {
    for (let j = 0; j < basis.count; j++) {
      if (j !== i) total += (isExtreme.has(j) ? 1 : 2) * pairTerm(parts.u, i, j, m, p);
    }
  }
  return total;
}

/** V_CR2 of the contrasts: Σ(h_s'B_ic_i)(h_t'B_ic_i) (m × m). */
function covariance(basis: ClusterBasis, directions: readonly Float64Array[]): Matrix {
  const { p } = basis.fit;
  const m = directions.length;
  const v = new Matrix(m, m);
  const weighted = weightedDirections(basis, directions);
  const scores = new Float64Array(m);
  for (let i = 0; i < basis.count; i++) {
    weighted.forEach((along, s) => {
      let sum = 0;
      for (let at = i * p; at < (i + 1) * p; at++) sum += along[at]! * basis.turned[at]!;
      scores[s] = sum;
    });
    for (let s = 0; s < m; s++) {
      for (let t = 0; t < m; t++) v.set(s, t, v.get(s, t) + scores[s]! * scores[t]!);
    }
  }
  return v;
}

/** The symmetric inverse square root of a positive definite matrix (m × m); null where it is not. */
function inverseRoot(omega: Matrix): Matrix | null {
  const eigen = new EigenvalueDecomposition(omega, { assumeSymmetric: true });
  const values = eigen.realEigenvalues;
  const largest = Math.max(...values);
  if (!(largest > 0) || values.some((value) => value <= 1e-14 * largest)) return null;
  const vectors = eigen.eigenvectorMatrix;
  const shrunk = vectors.clone().mulRowVector(values.map((value) => 1 / Math.sqrt(value)));
  return shrunk.mmul(vectors.transpose());
}

/**
 * The joint test HTZ of m contrasts being 0, by CR2 (Pustejovsky & Tipton 2018; Hotelling's T² approximation with
 * Zhang's degrees of freedom). m = 1 is the Satterthwaite t test squared.
 *
 * @param contrasts m directions h (p each, see `contrastDirection`)
 * @param values m values Cβ̂
 * @returns null where the covariance is singular or fewer than one df is left
 */
export function jointTest(
  basis: ClusterBasis,
  contrasts: readonly Float64Array[],
  values: ArrayLike<number>,
): JointTest | null {
  const m = contrasts.length;
  // F does not change when a contrast is multiplied; unit lengths keep squares of squares in range.
  const lengths = contrasts.map((h) => Math.sqrt(dot(h, h)));
  const directions = contrasts.map((h, s) => shiftAndScale(h, 0, 1 / lengths[s]!));
  const estimates = lengths.map((length, s) => values[s]! / length);
  const root = inverseRoot(partsOf(basis, directions).omega);
  const factor = new CholeskyDecomposition(covariance(basis, directions));
  if (!root || !factor.isPositiveDefinite()) return null;
  const scaled = root
    .mmul(new Matrix(directions))
    .to2DArray()
    .map((h) => Float64Array.from(h));
  const eta = (m * (m + 1)) / spread(basis, partsOf(basis, scaled), m);
  const df2 = eta - m + 1;
  if (!(df2 > 0)) return null;
  const column = Matrix.columnVector(estimates);
  const quadratic = factor.solve(column).dot(column);
  const f = (df2 / (eta * m)) * quadratic;
  return { f, df1: m, df2, p: fUpper(f, m, df2) };
}
