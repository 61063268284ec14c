import type { ClusterBasis } from './cluster-basis.ts';

/** Cluster-robust standard errors of one contrast. */
export interface ClusterErrors {
  readonly cr0: number;
  /** CR0 · G/(G − 1) on the variance. */
  readonly cr1: number;
  /** CR0 · G(N − 1)/((G − 1)(N − p)) on the variance. */
  readonly cr1s: number;
  readonly cr2: number;
  /** Null where a subject has leverage one. */
  readonly cr3: number | null;
}

/** Below this share of the ordinary error an error is rounding, and is 0. */
const ROUNDING = 1e-13;

/**
 * Standard errors of a contrast by CR0 to CR3; `along` is the `turnDirection` (G × p) of its direction in unit
 * length, `length` that direction's length.
 *
 * A_iQ_i = Q_iB_i with B_i = E f(Λ)E', so V(l'β̂) = Σ(h'B_ic_i)² (Liang & Zeger 1986; Bell & McCaffrey 2002;
 * Pustejovsky & Tipton 2018; identity target). CR3 has no G factor.
 */
export function clusterErrors(
  basis: ClusterBasis,
  along: Float64Array,
  length: number,
): ClusterErrors {
  const { n, p } = basis.fit;
  const { turned, cr2: factor } = basis;
  let cr0 = 0;
  let cr2 = 0;
  let cr3 = 0;
  for (let i = 0, at = 0; i < basis.count; i++) {
    let sum0 = 0;
    let sum2 = 0;
    let sum3 = 0;
    for (let k = 0; k < p; k++, at++) {
      const term = along[at]! * turned[at]!;
      const f = factor[at]!;
      sum0 += term;
      sum2 += term * f;
      sum3 += term * f * f;
    }
    cr0 += sum0 * sum0;
    cr2 += sum2 * sum2;
    cr3 += sum3 * sum3;
  }
  const g = basis.count;
  const least = ROUNDING * ROUNDING * basis.fit.sigmaSquared;
  const root = (variance: number) => (variance > least ? length * Math.sqrt(variance) : 0);
  return {
    cr0: root(cr0),
    cr1: root((cr0 * g) / (g - 1)),
    cr1s: root((cr0 * g * (n - 1)) / ((g - 1) * (n - p))),
    cr2: root(cr2),
    cr3: basis.fixing.length > 0 ? null : root(cr3),
  };
}
