import type { OlsFit } from '../linear/fit-ols.ts';

/**
 * Moulton's factor (1986) of the contrast with direction h (p): by what a purely exchangeable correlation `icc` of
 * the errors multiplies its ordinary standard error, √(1 − ρ + ρ Σ(h'a_i)²/h'h), a_i = Q_i'1. For one covariate
 * √(1 + [Var(n_i)/n̄ + n̄ − 1]·ICC(x)·ICC(e)). Null where the radicand is not positive.
 */
export function moultonFactor(
  fit: OlsFit,
  start: Int32Array,
  h: Float64Array,
  icc: number,
): number | null {
  let hh = 0;
  for (const x of h) hh += x * x;
  let sum = 0;
  for (let i = 0; i < start.length - 1; i++) {
    let along = 0;
    for (let k = 0; k < fit.p; k++) {
      const column = fit.q[k]!;
      let total = 0;
      for (let r = start[i]!; r < start[i + 1]!; r++) total += column[r]!;
      along += h[k]! * total;
    }
    sum += along * along;
  }
  const radicand = 1 - icc + (icc * sum) / hh;
  return radicand > 0 ? Math.sqrt(radicand) : null;
}
