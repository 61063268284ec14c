import { incompleteBeta } from './incomplete-beta.ts';
import { invertTail } from './invert-tail.ts';
import { normalQuantile, normalUpper } from './normal.ts';
import { stirlingRemainder } from './stirling.ts';

/** P(|T| > |t|) of Student's t with df > 0 degrees of freedom (need not be whole; Infinity is the normal). */
export function studentTwoSided(t: number, df: number): number {
  if (!(df > 0) || Number.isNaN(t)) return Number.NaN;
  const size = Math.abs(t);
  if (df === Number.POSITIVE_INFINITY) return 2 * normalUpper(size);
  const square = size * size;
  // So far out only the leading term is left, and the square would overflow.
  if (square > 1e290 * df) return 2 * Math.exp(logFarTail(size, df));
  const total = df + square;
  return incompleteBeta(df / 2, 0.5, df / total, square / total);
}

/** P(T > t). */
export function studentUpper(t: number, df: number): number {
  const tail = 0.5 * studentTwoSided(t, df);
  return t >= 0 ? tail : 1 - tail;
}

/** log of Γ((ν+1)/2)/(√(νπ) Γ(ν/2)) by Stirling remainders, so that a large ν keeps its digits. */
function logConstant(df: number): number {
  const half = df / 2;
  return (
    half * Math.log1p(0.5 / half) -
    0.5 +
    stirlingRemainder(half + 0.5) -
    stirlingRemainder(half) -
    0.5 * Math.log(2 * Math.PI)
  );
}

/** log P(T > t) to leading order for t² vastly above ν: constant · ν^((ν+1)/2) t^−ν / ν. */
function logFarTail(t: number, df: number): number {
  return logConstant(df) + (0.5 * (df + 1) - 1) * Math.log(df) - df * Math.log(t);
}

/** The density of Student's t. */
export function studentDensity(t: number, df: number): number {
  const square = t * t;
  if (square > 1e290 * df) return Math.exp(logFarTail(t, df)) * (df / t);
  return Math.exp(logConstant(df) - 0.5 * (df + 1) * Math.log1p(square / df));
}

/** P(0 < T < t), t ≥ 0, without subtraction from one. */
function centralArea(t: number, df: number): number {
  const square = t * t;
  const total = df + square;
  return 0.5 * incompleteBeta(0.5, df / 2, square / total, df / total);
}

/** The t with P(T ≤ t) = p; ∓Infinity at 0 and 1, NaN outside. */
export function studentQuantile(p: number, df: number): number {
  if (!(p >= 0 && p <= 1) || !(df > 0)) return Number.NaN;
  if (df === Number.POSITIVE_INFINITY) return normalQuantile(p);
  if (p === 0) return Number.NEGATIVE_INFINITY;
  if (p === 1) return Number.POSITIVE_INFINITY;
  if (p === 0.5) return 0;
  const sign = p < 0.5 ? -1 : 1;
  const small = Math.min(p, 1 - p);
  const density = (t: number) => studentDensity(t, df);
  if (small > 0.4) {
    const area = Math.abs(p - 0.5);
    const tail = { probability: (t: number) => centralArea(t, df), density, rising: true };
    return sign * invertTail(tail, area, area * 2.5);
  }
  const tail = { probability: (t: number) => studentUpper(t, df), density, rising: false };
  const z = -normalQuantile(small);
  return sign * invertTail(tail, small, z * (1 + (z * z + 1) / (4 * df)));
}
