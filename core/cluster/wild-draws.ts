import type { ClusterBasis } from './cluster-basis.ts';
import type { WeightSource } from './wild-weights.ts';

/**
 * The bootstrap of one coefficient, kept so that its p value costs O(B) at any null value. δ stands for β̂ − b:
 * imposing β_k = b makes the numerator n_e + δ n_x and the squared CR1 error g·(Q_ee + 2δ Q_ex + δ² Q_xx).
 */
export interface WildDraws {
  readonly count: number;
  readonly ne: Float64Array;
  readonly nx: Float64Array;
  readonly qee: Float64Array;
  readonly qex: Float64Array;
  readonly qxx: Float64Array;
  /** Σ s^e s^e, Σ s^e s^x, Σ s^x s^x of the unweighted data: the scale on which a draw counts as 0. */
  readonly scale: readonly [number, number, number];
  /** G/(G − 1). */
  readonly factor: number;
}

/** Rounding of a squared error and of a squared numerator, relative to the data's scale. */
const ERROR_ROUNDING = 1e-13;
const NUMERATOR_ROUNDING = 1e-24;

/** Per subject: s^e, s^x, c^e (p), c^x (p), s^eA (p), s^xA (p), the pieces of statistics on residuals and column. */
function subjectTable(
  basis: ClusterBasis,
  h: Float64Array,
): { table: Float64Array; aa: Float64Array } {
  const { p } = basis.fit;
  const width = 2 + 4 * p;
  const table = new Float64Array(basis.count * width);
  const aa = new Float64Array(p * p);
  const a = new Float64Array(p);
  let hh = 0;
  for (const x of h) hh += x * x;
  for (let i = 0; i < basis.count; i++) {
    let se = 0;
    let sx = 0;
    for (let j = 0; j < p; j++) {
      let sum = 0;
      for (let k = 0; k < p; k++) sum += basis.s[(i * p + j) * p + k]! * h[k]!;
      a[j] = sum;
      se += h[j]! * basis.c[i * p + j]!;
      sx += (h[j]! * sum) / hh;
    }
    const at = i * width;
    table[at] = se;
    table[at + 1] = sx;
    for (let j = 0; j < p; j++) {
      table[at + 2 + j] = basis.c[i * p + j]!;
      table[at + 2 + p + j] = a[j]! / hh;
      table[at + 2 + 2 * p + j] = se * a[j]!;
      table[at + 2 + 3 * p + j] = sx * a[j]!;
      for (let k = 0; k < p; k++) aa[j * p + k]! += a[j]! * a[k]!;
    }
  }
  return { table, aa };
}

/** Weighted sums of the table's columns for one weight vector. */
function weightedSums(
  table: Float64Array,
  width: number,
  w: Float64Array,
  sums: Float64Array,
): void {
  sums.fill(0);
  for (let i = 0; i < w.length; i++) {
    const weight = w[i]!;
    const at = i * width;
    for (let j = 0; j < width; j++) sums[j]! += weight * table[at + j]!;
  }
}

/**
 * Draws the wild cluster bootstrap of the coefficient with direction h, null imposed, by weighted sums of a
 * G × (2 + 4p) table: equal to refitting every draw, O(Gp) each (after Roodman et al. 2019).
 */
export function drawWild(basis: ClusterBasis, h: Float64Array, source: WeightSource): WildDraws {
  const { p } = basis.fit;
  const width = 2 + 4 * p;
  const { table, aa } = subjectTable(basis, h);
  const { count } = source;
  const scale: [number, number, number] = [0, 0, 0];
  for (let i = 0; i < basis.count; i++) {
    const se = table[i * width]!;
    const sx = table[i * width + 1]!;
    scale[0] += se * se;
    scale[1] += se * sx;
    scale[2] += sx * sx;
  }
  const draws = {
    count,
    scale,
    ne: new Float64Array(count),
    nx: new Float64Array(count),
    qee: new Float64Array(count),
    qex: new Float64Array(count),
    qxx: new Float64Array(count),
    factor: basis.count / (basis.count - 1),
  };
  const w = new Float64Array(basis.count);
  const sums = new Float64Array(width);
  const aadX = new Float64Array(p);
  const aadE = new Float64Array(p);
  const fe = 2 + 2 * p;
  const fx = 2 + 3 * p;
  for (let draw = 0; draw < count; draw++) {
    source.fill(draw, w);
    weightedSums(table, width, w, sums);
    let [ee, ex, xx] = source.signs ? scale : [0, 0, 0];
    for (let i = 0; i < w.length && !source.signs; i++) {
      const square = w[i]! * w[i]!;
      const se = table[i * width]!;
      const sx = table[i * width + 1]!;
      ee += square * se * se;
      ex += square * se * sx;
      xx += square * sx * sx;
    }
    for (let j = 0; j < p; j++) {
      aadE[j] = 0;
      aadX[j] = 0;
      for (let k = 0; k < p; k++) {
        aadE[j]! += aa[j * p + k]! * sums[2 + k]!;
        aadX[j]! += aa[j * p + k]! * sums[2 + p + k]!;
      }
    }
    for (let j = 0; j < p; j++) {
      const de = sums[2 + j]!;
      const dx = sums[2 + p + j]!;
      ee += de * (aadE[j]! - 2 * sums[fe + j]!);
      xx += dx * (aadX[j]! - 2 * sums[fx + j]!);
      ex += de * (aadX[j]! - sums[fx + j]!) - dx * sums[fe + j]!;
    }
    // A draw that leaves the column's own residuals at 0, as the identity does, has no error in δ at all: rounding
    // there would be multiplied by δ² and would end intervals that have no end.
    if (xx <= ERROR_ROUNDING * scale[2]) {
      xx = 0;
      ex = 0;
    }
    draws.ne[draw] = sums[0]!;
    draws.nx[draw] = sums[1]!;
    draws.qee[draw] = ee;
    draws.qex[draw] = ex;
    draws.qxx[draw] = xx;
  }
  return draws;
}

/** A draw at or above (1 − this) of the observed statistic counts as reaching it. */
const TIE = 1e-9;

/**
 * The share of draws with |t*| ≥ |t| when β_k = β̂ − δ is imposed; `se` is the CR1 error of β̂. No draw is added:
 * the identity is among the enumerated ones. 0/0 does not count.
 */
export function wildP(draws: WildDraws, delta: number, se: number): number {
  const bound = (Math.abs(delta) / se) * (1 - TIE);
  const square = bound * bound * draws.factor;
  const scale = draws.scale[0] + delta * (2 * draws.scale[1] + delta * draws.scale[2]);
  let reached = 0;
  for (let k = 0; k < draws.count; k++) {
    const numerator = draws.ne[k]! + delta * draws.nx[k]!;
    const q = draws.qee[k]! + delta * (2 * draws.qex[k]! + delta * draws.qxx[k]!);
    const squared = numerator * numerator;
    if (q <= ERROR_ROUNDING * scale && squared <= NUMERATOR_ROUNDING * scale) continue;
    if (squared >= square * Math.max(0, q)) reached++;
  }
  return reached / draws.count;
}
