import { type ClusterBasis, turn } from './cluster-basis.ts';
import { cr2Factor } from './sandwich.ts';

/** Above this leverage a subject's pairs are added one by one: the short form would cancel. */
export const EXTREME_LEVERAGE = 0.9;

/** The subjects with an eigenvalue above .9: at most p/.9 of them, as ΣS_i = I. */
export function extremeSubjects(basis: ClusterBasis): number[] {
  const { p } = basis.fit;
  const found: number[] = [];
  for (let i = 0; i < basis.count; i++) {
    for (let k = 0; k < p; k++) {
      if (basis.lambda[i * p + k]! > EXTREME_LEVERAGE) {
        found.push(i);
        break;
      }
    }
  }
  return found;
}

function dotOfRows(u: Float64Array, i: number, j: number, p: number): number {
  let sum = 0;
  for (let a = 0; a < p; a++) sum += u[i * p + a]! * u[j * p + a]!;
  return sum;
}

/**
 * Satterthwaite degrees of freedom of the CR2 error of the contrast with direction h (p), working model of
 * independent errors with equal variance; null where the contrast has no variance left to estimate.
 *
 * ν = (ΣP_ii)²/(ΣP_ii² + Σ_{i≠j}(u_i'u_j)²), u_i = S_iB_ih (Bell & McCaffrey 2002, Pustejovsky & Tipton 2018, all
 * from p × p matrices). O(Gp²).
 */
export function satterthwaiteDf(basis: ClusterBasis, h: Float64Array): number | null {
  const { p } = basis.fit;
  const extreme = extremeSubjects(basis);
  const along = new Float64Array(p);
  const u = new Float64Array(basis.count * p);
  const outer = new Float64Array(p * p);
  let trace = 0;
  let squares = 0;
  let fourth = 0;
  let next = 0;
  for (let i = 0; i < basis.count; i++) {
    turn(basis, i, h, along);
    let own = 0;
    for (let k = 0; k < p; k++) {
      const lambda = basis.lambda[i * p + k]!;
      const part = along[k]! * cr2Factor(lambda);
      own += lambda * (1 - lambda) * part * part;
      along[k] = lambda * part;
    }
    trace += own;
    squares += own * own;
    for (let a = 0; a < p; a++) {
      let sum = 0;
      for (let k = 0; k < p; k++) sum += basis.vectors[(i * p + a) * p + k]! * along[k]!;
      u[i * p + a] = sum;
    }
    if (extreme[next] === i) {
      next++;
      continue;
    }
    const length = dotOfRows(u, i, i, p);
    fourth += length * length;
    for (let a = 0; a < p; a++) {
      for (let b = 0; b < p; b++) outer[a * p + b]! += u[i * p + a]! * u[i * p + b]!;
    }
  }
  let off = -fourth;
  for (const x of outer) off += x * x;
  off += extremePairs(u, extreme, basis.count, p);
  const denominator = squares + Math.max(0, off);
  return denominator > 0 ? (trace * trace) / denominator : null;
}

/** Σ over ordered pairs with an extreme subject of (u_i'u_j)², each pair by itself. */
function extremePairs(
  u: Float64Array,
  extreme: readonly number[],
  count: number,
  p: number,
): number {
  let sum = 0;
  const isExtreme = new Set(extreme);
  for (const i of extreme) {
    for (let j = 0; j < count; j++) {
      if (j === i) continue;
      const square = dotOfRows(u, i, j, p) ** 2;
      sum += isExtreme.has(j) ? square : 2 * square;
    }
  }
  return sum;
}
