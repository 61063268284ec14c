/// <reference path="./jstat.d.ts" />
import jstat from 'jstat';

/**
 * The two small differences that carry the accuracy of the tails: Stirling's remainder and the deviance term.
 * Written out of them, the prefactors of the incomplete beta and gamma need no logarithm of a gamma function and
 * keep their relative accuracy however large the shape parameters are (Loader 2000, "Fast and accurate
 * computation of binomial probabilities").
 */

const { jStat } = jstat;

/** From here on the series is exact to double precision, where log Γ would lose the digits that cancel. */
const SERIES_FROM = 8;
const HALF_LOG_TWO_PI = 0.5 * Math.log(2 * Math.PI);

/**
 * log Γ(a) − [(a − ½) log a − a + ½ log 2π], for a > 0.
 *
 * Asymptotic series from 8 on (its next term is below 1e-15 there); below it straight from log Γ, to 1e-13.
 */
export function stirlingRemainder(a: number): number {
  if (a < SERIES_FROM) return jStat.gammaln(a) - ((a - 0.5) * Math.log(a) - a + HALF_LOG_TWO_PI);
  const inverse = 1 / a;
  const square = inverse * inverse;
  const series =
    1 / 12 -
    square *
      (1 / 360 -
        square *
          (1 / 1260 -
            square * (1 / 1680 - square * (1 / 1188 - square * (691 / 360360 - square / 156)))));
  return series * inverse;
}

/**
 * a·log(a/m) + m − a for a, m > 0: half the deviance of a count a about its mean m, never negative.
 *
 * Near a = m the series in v = (a − m)/(a + m) avoids the cancellation of the plain form.
 */
export function devianceTerm(a: number, m: number): number {
  const difference = a - m;
  if (Math.abs(difference) < 0.1 * (a + m)) {
    const v = difference / (a + m);
    const square = v * v;
    let sum = difference * v;
    let term = 2 * a * v;
    for (let j = 3; j < 200; j += 2) {
      term *= square;
      const next = sum + term / j;
      if (next === sum) return next;
      sum = next;
    }
    return sum;
  }
  return a * Math.log(a / m) + m - a;
}
