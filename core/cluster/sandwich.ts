import { type ClusterBasis, turn } from './cluster-basis.ts';

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

/** f(λ) of CR2: (1 − λ)^(−½), and 0 where the subject fixes the direction. */
export function cr2Factor(lambda: number): number {
  return lambda === 1 ? 0 : 1 / Math.sqrt(1 - lambda);
}

/**
 * Standard errors of the contrast with direction h (p, see `contrastDirection`) by CR0 to CR3.
 *
 * A_iQ_i = Q_iB_i with B_i = E f(Λ)E', so V(l'β̂) = Σ(h'B_ic_i)² (Liang & Zeger 1986; Bell & McCaffrey 2002;
 * Pustejovsky & Tipton 2018; identity target). CR3 has no G factor.
 */
export function clusterErrors(basis: ClusterBasis, h: Float64Array): ClusterErrors {
  const { n, p } = basis.fit;
  const along = new Float64Array(p);
  let cr0 = 0;
  let cr2 = 0;
  let cr3 = 0;
  let singular = false;
  for (let i = 0; i < basis.count; i++) {
    turn(basis, i, h, along);
    let sum0 = 0;
    let sum2 = 0;
    let sum3 = 0;
    for (let k = 0; k < p; k++) {
      const lambda = basis.lambda[i * p + k]!;
      const term = along[k]! * basis.turned[i * p + k]!;
      sum0 += term;
      if (lambda === 1) singular = true;
      else {
        sum2 += term * cr2Factor(lambda);
        sum3 += term / (1 - lambda);
      }
    }
    cr0 += sum0 * sum0;
    cr2 += sum2 * sum2;
    cr3 += sum3 * sum3;
  }
  const g = basis.count;
  return {
    cr0: Math.sqrt(cr0),
    cr1: Math.sqrt((cr0 * g) / (g - 1)),
    cr1s: Math.sqrt((cr0 * g * (n - 1)) / ((g - 1) * (n - p))),
    cr2: Math.sqrt(cr2),
    cr3: singular ? null : Math.sqrt(cr3),
  };
}
