/**
 * The two small differences that carry the accuracy of the tails: Stirling's remainder and the deviance term.
 * Written out of them, the prefactors of the incomplete beta and gamma need no logarithm of a gamma function and
 * keep their relative accuracy however large the shape parameters are (Loader 2000, "Fast and accurate
 * computation of binomial probabilities").
 */

const SERIES_FROM = 15;

/**
 * log Γ(a) − [(a − ½) log a − a + ½ log 2π], for a > 0.
 *
 * Asymptotic series from 15 on; below it steps up by δ(a) = δ(a + 1) + (a + ½) log(1 + 1/a) − 1, which is exact.
 */
export function stirlingRemainder(a: number): number {
  let shifted = a;
  let sum = 0;
  while (shifted < SERIES_FROM) {
    sum += (shifted + 0.5) * Math.log1p(1 / shifted) - 1;
    shifted += 1;
  }
  const inverse = 1 / shifted;
  const square = inverse * inverse;
  const series =
    1 / 12 -
    square *
      (1 / 360 -
        square *
          (1 / 1260 -
            square * (1 / 1680 - square * (1 / 1188 - square * (691 / 360360 - square / 156)))));
  return sum + series * inverse;
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
