import type { ClusterBasis } from './cluster-basis.ts';

function dotOfRows(u: Float64Array, i: number, j: number, p: number): number {
  let sum = 0;
  for (let a = 0; a < p; a++) sum += u[i * p + a]! * u[j * p + a]!;
  return sum;
}

/**
 * Satterthwaite degrees of freedom of the CR2 error of a contrast (`along` is its `turnDirection`, G × p), working
 * model of independent errors with equal variance; null where the contrast has no variance left to estimate.
 *
 * ν = (ΣP_ii)²/(ΣP_ii² + Σ_{i≠j}(u_i'u_j)²), u_i = S_iB_ih (Bell & McCaffrey 2002, Pustejovsky & Tipton 2018, all
 * from p × p matrices). O(Gp²).
 */
export function satterthwaiteDf(basis: ClusterBasis, along: Float64Array): number | null {
  const { p } = basis.fit;
  const { count, lambda, vectors, cr2, extreme } = basis;
  const u = new Float64Array(count * p);
  const turned = new Float64Array(p);
  const outer = new Float64Array(p * p);
  let trace = 0;
  let squares = 0;
  let fourth = 0;
  let next = 0;
  for (let i = 0; i < count; i++) {
    const row = i * p;
    let own = 0;
    for (let k = 0; k < p; k++) {
      const at = row + k;
      const part = along[at]! * cr2[at]!;
      turned[k] = lambda[at]! * part;
      own += turned[k]! * (1 - lambda[at]!) * part;
    }
    trace += own;
    squares += own * own;
    let length = 0;
    for (let a = 0; a < p; a++) {
      let sum = 0;
      for (let k = 0; k < p; k++) sum += vectors[(row + a) * p + k]! * turned[k]!;
      u[row + a] = sum;
      length += sum * sum;
    }
    if (extreme[next] === i) {
      next++;
      continue;
    }
    fourth += length * length;
    for (let a = 0; a < p; a++) {
      const left = u[row + a]!;
      for (let b = 0; b < p; b++) outer[a * p + b]! += left * u[row + b]!;
    }
  }
  let off = -fourth;
  for (const x of outer) off += x * x;
  off += extremePairs(u, extreme, count, p);
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
