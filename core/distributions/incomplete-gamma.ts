import { devianceTerm, stirlingRemainder } from './stirling.ts';

const TINY = 1e-300;
const RELATIVE = 1e-16;

/** x^a e^−x / Γ(a). */
function prefactor(a: number, x: number): number {
  return Math.sqrt(a / (2 * Math.PI)) * Math.exp(-stirlingRemainder(a) - devianceTerm(a, x));
}

/** P(a, x) by its power series, for x < a + 1. */
function lowerSeries(a: number, x: number): number {
  const limit = 500 + 40 * Math.ceil(Math.sqrt(a));
  let term = 1 / a;
  let sum = term;
  for (let k = 1; k <= limit; k++) {
    term *= x / (a + k);
    sum += term;
    if (term <= sum * RELATIVE) break;
  }
  return sum * prefactor(a, x);
}

/** Q(a, x) by its continued fraction (modified Lentz), for x ≥ a + 1. */
function upperFraction(a: number, x: number): number {
  const limit = 500 + 40 * Math.ceil(Math.sqrt(a));
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / b;
  let value = d;
  for (let k = 1; k <= limit; k++) {
    const numerator = -k * (k - a);
    b += 2;
    d = numerator * d + b;
    if (Math.abs(d) < TINY) d = TINY;
    c = b + numerator / c;
    if (Math.abs(c) < TINY) c = TINY;
    d = 1 / d;
    const step = d * c;
    value *= step;
    if (Math.abs(step - 1) <= RELATIVE) break;
  }
  return value * prefactor(a, x);
}

/** The regularised lower incomplete gamma function P(a, x), a > 0, x ≥ 0; NaN outside. */
export function incompleteGammaLower(a: number, x: number): number {
  if (!(a > 0 && x >= 0)) return Number.NaN;
  if (x === 0) return 0;
  if (x === Number.POSITIVE_INFINITY) return 1;
  return x < a + 1 ? lowerSeries(a, x) : 1 - upperFraction(a, x);
}

/** The regularised upper incomplete gamma function Q(a, x) = 1 − P(a, x), without loss in the far tail. */
export function incompleteGammaUpper(a: number, x: number): number {
  if (!(a > 0 && x >= 0)) return Number.NaN;
  if (x === 0) return 1;
  if (x === Number.POSITIVE_INFINITY) return 0;
  return x < a + 1 ? 1 - lowerSeries(a, x) : upperFraction(a, x);
}
