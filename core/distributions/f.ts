import { incompleteBeta } from './incomplete-beta.ts';
import { invertTail } from './invert-tail.ts';
import { devianceTerm, stirlingRemainder } from './stirling.ts';

/** P(F > x) of Fisher's F on d1 and d2 degrees of freedom (positive, need not be whole). */
export function fUpper(x: number, d1: number, d2: number): number {
  if (!(d1 > 0 && d2 > 0) || Number.isNaN(x)) return Number.NaN;
  if (x <= 0) return 1;
  const ratio = d1 * x;
  if (ratio === Number.POSITIVE_INFINITY) return 0;
  const total = d2 + ratio;
  return incompleteBeta(d2 / 2, d1 / 2, d2 / total, ratio / total);
}

/** P(F ≤ x). */
export function fLower(x: number, d1: number, d2: number): number {
  if (!(d1 > 0 && d2 > 0) || Number.isNaN(x)) return Number.NaN;
  if (x <= 0) return 0;
  const ratio = d1 * x;
  if (ratio === Number.POSITIVE_INFINITY) return 1;
  const total = d2 + ratio;
  return incompleteBeta(d1 / 2, d2 / 2, ratio / total, d2 / total);
}

function density(x: number, d1: number, d2: number): number {
  const a = d1 / 2;
  const b = d2 / 2;
  const total = d2 + d1 * x;
  const u = (d1 * x) / total;
  const v = d2 / total;
  const exponent =
    stirlingRemainder(a + b) -
    stirlingRemainder(a) -
    stirlingRemainder(b) -
    devianceTerm(a, (a + b) * u) -
    devianceTerm(b, (a + b) * v);
  return (Math.sqrt((a / (a + b)) * (b / (2 * Math.PI))) * Math.exp(exponent)) / x;
}

/** The x with P(F ≤ x) = p; 0 and Infinity at the ends, NaN outside. */
export function fQuantile(p: number, d1: number, d2: number): number {
  if (!(p >= 0 && p <= 1) || !(d1 > 0 && d2 > 0)) return Number.NaN;
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  const rising = p < 0.5;
  const probability = rising ? (x: number) => fLower(x, d1, d2) : (x: number) => fUpper(x, d1, d2);
  const tail = { probability, density: (x: number) => density(x, d1, d2), rising };
  return invertTail(tail, rising ? p : 1 - p, 1);
}
