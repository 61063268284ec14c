import { incompleteGammaLower, incompleteGammaUpper } from './incomplete-gamma.ts';
import { invertTail } from './invert-tail.ts';
import { devianceTerm, stirlingRemainder } from './stirling.ts';

/** P(χ² > x) on df > 0 degrees of freedom (need not be whole). */
export function chiSquaredUpper(x: number, df: number): number {
  if (!(df > 0) || Number.isNaN(x)) return Number.NaN;
  return x <= 0 ? 1 : incompleteGammaUpper(df / 2, x / 2);
}

/** P(χ² ≤ x). */
export function chiSquaredLower(x: number, df: number): number {
  if (!(df > 0) || Number.isNaN(x)) return Number.NaN;
  return x <= 0 ? 0 : incompleteGammaLower(df / 2, x / 2);
}

function density(x: number, df: number): number {
  const a = df / 2;
  const exponent = -stirlingRemainder(a) - devianceTerm(a, x / 2);
  return (Math.sqrt(a / (2 * Math.PI)) * Math.exp(exponent)) / x;
}

/** The x with P(χ² ≤ x) = p; 0 and Infinity at the ends, NaN outside. */
export function chiSquaredQuantile(p: number, df: number): number {
  if (!(p >= 0 && p <= 1) || !(df > 0)) return Number.NaN;
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  const rising = p < 0.5;
  const probability = rising
    ? (x: number) => chiSquaredLower(x, df)
    : (x: number) => chiSquaredUpper(x, df);
  const tail = { probability, density: (x: number) => density(x, df), rising };
  return invertTail(tail, rising ? p : 1 - p, df);
}
