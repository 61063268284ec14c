import type { ClusterBasis } from './cluster-basis.ts';

/** The sums over subjects that the degrees of freedom are made of, extreme subjects left out of the last two. */
interface Sums {
  /** ΣP_ii and ΣP_ii². */
  trace: number;
  squares: number;
  /** Σ|u_i|⁴ and ‖Σu_iu_i'‖²_F. */
  fourth: number;
  outer: number;
}

/** Writes u_i = S_iB_ih (p) of subject i; `along` is E_i'h of every subject. */
function writeU(basis: ClusterBasis, along: Float64Array, i: number, into: Float64Array): void {
  const { p } = basis.fit;
  for (let a = 0; a < p; a++) {
    let sum = 0;
    for (let k = 0; k < p; k++) {
      const at = i * p + k;
      sum += basis.vectors[(i * p + a) * p + k]! * basis.lambda[at]! * along[at]! * basis.cr2[at]!;
    }
    into[a] = sum;
  }
}

function dot(u: Float64Array, v: Float64Array): number {
  let sum = 0;
  for (let a = 0; a < u.length; a++) sum += u[a]! * v[a]!;
  return sum;
}

/** The sums for two columns, with as few reads as there can be: of the time of a large fit this is the most. */
function sumsForTwo(basis: ClusterBasis, along: Float64Array): Sums {
  const { count, lambda, vectors, cr2, extreme } = basis;
  let trace = 0;
  let squares = 0;
  let fourth = 0;
  let xx = 0;
  let xy = 0;
  let yy = 0;
  let next = 0;
  for (let i = 0; i < count; i++) {
    const first = lambda[2 * i]!;
    const second = lambda[2 * i + 1]!;
    const a = along[2 * i]! * cr2[2 * i]!;
    const b = along[2 * i + 1]! * cr2[2 * i + 1]!;
    const own = first * (1 - first) * a * a + second * (1 - second) * b * b;
    trace += own;
    squares += own * own;
    if (extreme[next] === i) {
      next++;
      continue;
    }
    const cosine = vectors[4 * i]!;
    const sine = vectors[4 * i + 2]!;
    const x = cosine * first * a - sine * second * b;
    const y = sine * first * a + cosine * second * b;
    xx += x * x;
    xy += x * y;
    yy += y * y;
    fourth += (x * x + y * y) ** 2;
  }
  return { trace, squares, fourth, outer: xx * xx + 2 * xy * xy + yy * yy };
}

function sumsForAny(basis: ClusterBasis, along: Float64Array): Sums {
  const { p } = basis.fit;
  const { count, lambda, cr2, extreme } = basis;
  const isExtreme = new Set(extreme);
  const u = new Float64Array(p);
  const cross = new Float64Array(p * p);
  const sums: Sums = { trace: 0, squares: 0, fourth: 0, outer: 0 };
  for (let i = 0; i < count; i++) {
    let own = 0;
    for (let at = i * p; at < (i + 1) * p; at++) {
      const part = along[at]! * cr2[at]!;
      own += lambda[at]! * (1 - lambda[at]!) * part * part;
    }
    sums.trace += own;
    sums.squares += own * own;
    if (isExtreme.has(i)) continue;
    writeU(basis, along, i, u);
    sums.fourth += dot(u, u) ** 2;
    for (let a = 0; a < p; a++) {
      for (let b = 0; b < p; b++) cross[a * p + b]! += u[a]! * u[b]!;
    }
  }
  sums.outer = dot(cross, cross);
  return sums;
}

/** Σ over ordered pairs with an extreme subject of (u_i'u_j)², each pair by itself. */
function extremePairs(basis: ClusterBasis, along: Float64Array): number {
  const { p } = basis.fit;
  const isExtreme = new Set(basis.extreme);
  const u = new Float64Array(p);
  const v = new Float64Array(p);
  let sum = 0;
  for (const i of basis.extreme) {
    writeU(basis, along, i, u);
    for (let j = 0; j < basis.count; j++) {
      if (j === i) continue;
      writeU(basis, along, j, v);
      sum += (isExtreme.has(j) ? 1 : 2) * dot(u, v) ** 2;
    }
  }
  return sum;
}

/**
 * Satterthwaite degrees of freedom of the CR2 error of a contrast (`along` is its `turnDirection`, G × p), working
 * model of independent errors with equal variance; null where the contrast has no variance left to estimate.
 *
 * ν = (ΣP_ii)²/(ΣP_ii² + Σ_{i≠j}(u_i'u_j)²), u_i = S_iB_ih (Bell & McCaffrey 2002, Pustejovsky & Tipton 2018, all
 * from p × p matrices). The sum over pairs is ‖Σu_iu_i'‖² − Σ|u_i|⁴, but pairs with an extreme subject are added
 * one by one, as that difference would cancel. O(Gp²).
 */
export function satterthwaiteDf(basis: ClusterBasis, along: Float64Array): number | null {
  const { p } = basis.fit;
  const sums = p === 2 ? sumsForTwo(basis, along) : sumsForAny(basis, along);
  const pairs = Math.max(0, sums.outer - sums.fourth + extremePairs(basis, along));
  const denominator = sums.squares + pairs;
  return denominator > 0 ? (sums.trace * sums.trace) / denominator : null;
}
