import { devianceTerm, stirlingRemainder } from './stirling.ts';

const TINY = 1e-300;
const RELATIVE = 1e-16;

/** x^a y^b / B(a, b) with y = 1 − x given apart, so that neither end loses digits. */
function prefactor(a: number, b: number, x: number, y: number): number {
  const total = a + b;
  const exponent =
    stirlingRemainder(total) -
    stirlingRemainder(a) -
    stirlingRemainder(b) -
    devianceTerm(a, total * x) -
    devianceTerm(b, total * y);
  return Math.sqrt((a / total) * (b / (2 * Math.PI))) * Math.exp(exponent);
}

/**
 * I_x(a, b) / prefactor for x up to about the mean, by the even part of the continued fraction (Didonato & Morris
 * 1992, ACM TOMS 18, eq. 9) in the modified Lentz form. Its terms hold a·y − b·x whole, so that nothing cancels
 * when a is huge and x near 1, as for t with very many degrees of freedom.
 */
function tailFraction(a: number, b: number, x: number, y: number): number {
  const limit = 200 + 12 * Math.ceil(Math.sqrt(Math.max(a, b)));
  const offset = a * y - b * x + 1;
  let value = (a * offset) / (a + 1);
  if (Math.abs(value) < TINY) value = TINY;
  let c = value;
  let d = 0;
  for (let m = 1; m <= limit; m++) {
    const s = a + 2 * m - 1;
    const product = (m * (b - m) * x) / s;
    const numerator = ((a + m - 1) / s) * (a + b + m - 1) * x * product;
    const denominator = m + product + ((a + m) / (s + 2)) * (offset + m * (1 + y));
    d = denominator + numerator * d;
    if (Math.abs(d) < TINY) d = TINY;
    c = denominator + numerator / c;
    if (Math.abs(c) < TINY) c = TINY;
    d = 1 / d;
    const step = c * d;
    value *= step;
    if (Math.abs(step - 1) <= RELATIVE) break;
  }
  return 1 / value;
}

/**
 * The regularised incomplete beta function I_x(a, b), a, b > 0, 0 ≤ x ≤ 1; NaN outside.
 *
 * `y` is 1 − x; give it when it is known without subtraction, and the result keeps its relative accuracy where
 * I is small as well as where 1 − I is. Continued fraction on the small tail (Press et al., modified Lentz).
 */
export function incompleteBeta(a: number, b: number, x: number, y: number = 1 - x): number {
  if (!(a > 0 && b > 0 && x >= 0 && y >= 0)) return Number.NaN;
  if (x === 0) return 0;
  if (y === 0) return 1;
  const front = prefactor(a, b, x, y);
  if (x * (a + b + 2) < a + 1) return front * tailFraction(a, b, x, y);
  return 1 - front * tailFraction(b, a, y, x);
}
