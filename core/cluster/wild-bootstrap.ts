import { dot, shiftAndScale } from '../linear/kernels.ts';
import { type ClusterBasis, turnDirection } from './cluster-basis.ts';
import { clusterErrors } from './sandwich.ts';
import { drawWild, type WildDraws, wildP } from './wild-draws.ts';
import { type WildWeights, webbSource, weightSource } from './wild-weights.ts';

/** The wild cluster bootstrap-t of one coefficient. */
export interface WildBootstrap {
  /** The CR1 statistic. */
  readonly t: number;
  readonly p: number;
  /** Limits of {b : p(b) > .05}; null where unbounded. */
  readonly lower: number | null;
  readonly upper: number | null;
  /** Draws used: 2^G when enumerated. */
  readonly draws: number;
  readonly weights: WildWeights;
  /** Only beside an enumeration of 5 subjects or fewer, whose p can't fall below 2^(1−G). */
  readonly webbP: number | null;
}

const LEVEL = 0.05;
const STEP = 0.25;
const RUN = 8;
const WIDEN_AFTER = 60;
const WIDEN_BY = 1.3;
const FARTHEST = 1e6;
const PRECISION = 1e-9;
const WEBB_BESIDE = 5;

/**
 * One end of the interval, as a distance from β̂ in units of se; `side` is +1 upwards, −1 downwards. Steps outwards
 * until p ≤ .05 eight times running, then bisects the last crossing. Null beyond a million se.
 */
function reach(draws: WildDraws, se: number, side: 1 | -1): number | null {
  // Imposing b = β̂ + side·x·se means δ = β̂ − b = −side·x·se.
  const inside = (x: number) => wildP(draws, -side * x * se, se) > LEVEL;
  let step = STEP;
  let x = 0;
  let lastInside = 0;
  let firstOutside = 0;
  let run = 0;
  for (let count = 1; run < RUN; count++) {
    x += step;
    if (x > FARTHEST) return null;
    if (inside(x)) {
      lastInside = x;
      run = 0;
    } else {
      if (run === 0) firstOutside = x;
      run++;
    }
    if (count >= WIDEN_AFTER) step *= WIDEN_BY;
  }
  while (firstOutside - lastInside > PRECISION) {
    const middle = 0.5 * (lastInside + firstOutside);
    if (inside(middle)) lastInside = middle;
    else firstOutside = middle;
  }
  return 0.5 * (lastInside + firstOutside);
}

/**
 * The wild cluster bootstrap-t of a coefficient with its test-inversion interval (Cameron, Gelbach & Miller 2008;
 * Webb 2013): null imposed, CR1 statistic, weights by the number of subjects.
 *
 * @param h direction of the coefficient (p, see `contrastDirection`)
 * @param draws B of the sampled kinds, and the largest number of sign vectors that is enumerated
 * @returns null where the CR1 error is 0
 */
export function wildBootstrap(
  basis: ClusterBasis,
  h: Float64Array,
  estimate: number,
  draws: number,
  seed: number,
): WildBootstrap | null {
  // In unit length, as the drawn pieces hold products of four directions.
  const length = Math.sqrt(dot(h, h));
  const unit = shiftAndScale(h, 0, 1 / length);
  const scaled = estimate / length;
  const se = clusterErrors(basis, turnDirection(basis, unit), 1).cr1;
  if (!basis.fit.hasVariance || !(se > 0)) return null;
  const source = weightSource(basis.count, draws, seed);
  const drawn = drawWild(basis, unit, source);
  const enumerated = source.kind === 'rademacher_enumerated';
  const down = reach(drawn, se, -1);
  const up = reach(drawn, se, 1);
  const beside = enumerated && basis.count <= WEBB_BESIDE;
  return {
    t: scaled / se,
    p: wildP(drawn, scaled, se),
    lower: down === null ? null : length * (scaled - down * se),
    upper: up === null ? null : length * (scaled + up * se),
    draws: enumerated ? 2 ** basis.count : source.count,
    weights: source.kind,
    webbP: beside ? wildP(drawWild(basis, unit, webbSource(seed, draws)), scaled, se) : null,
  };
}
