/// <reference path="./jstat.d.ts" />
import jstat from 'jstat';
import { incompleteGammaLower, incompleteGammaUpper } from './incomplete-gamma.ts';
import { invertTail } from './invert-tail.ts';

const { jStat } = jstat;
const density = (z: number): number => jStat.normal.pdf(z, 0, 1);

/** P(Z > z) of the standard normal, accurate relative to itself into the far tail. */
export function normalUpper(z: number): number {
  const half = 0.5 * z * z;
  return z >= 0
    ? 0.5 * incompleteGammaUpper(0.5, half)
    : 0.5 + 0.5 * incompleteGammaLower(0.5, half);
}

/** P(Z ≤ z) of the standard normal. */
export function normalLower(z: number): number {
  return normalUpper(-z);
}

/** The z with P(Z ≤ z) = p; ∓Infinity at 0 and 1, NaN outside [0, 1]. */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return Number.NaN;
  if (p === 0) return Number.NEGATIVE_INFINITY;
  if (p === 1) return Number.POSITIVE_INFINITY;
  if (p === 0.5) return 0;
  const small = Math.min(p, 1 - p);
  const sign = p < 0.5 ? -1 : 1;
  // Close to the middle the tail is flat on the log scale and the central area decides.
  if (small > 0.4) {
    const area = Math.abs(p - 0.5);
    const centre = {
      probability: (z: number) => 0.5 * incompleteGammaLower(0.5, 0.5 * z * z),
      density,
      rising: true,
    };
    return sign * invertTail(centre, area, area * Math.sqrt(2 * Math.PI));
  }
  const tail = { probability: normalUpper, density, rising: false };
  return sign * invertTail(tail, small, -jStat.normal.inv(small, 0, 1));
}
