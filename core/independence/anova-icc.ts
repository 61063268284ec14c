import { fQuantile } from '../distributions/f.ts';

/** At or below this share of Σv²/N a mean square is rounding. (64 ε)². */
const ROUNDING = (64 * 2 ** -52) ** 2;

/** One-way analysis of variance by subject, singletons included. */
export interface SubjectAnova {
  /** Between subjects, on G − 1 df. */
  readonly msb: number;
  /** Within subjects, on N − G df; exactly 0 where each subject's values are identical. */
  readonly msw: number;
  /** (N − Σn_i²/N)/(G − 1). */
  readonly n0: number;
  readonly dfBetween: number;
  readonly dfWithin: number;
}

function squaresOf(values: Float64Array): number {
  let sum = 0;
  for (let r = 0; r < values.length; r++) sum += values[r]! * values[r]!;
  return sum;
}

/**
 * The analysis of variance of `values` (N) by subject; `start` holds the G + 1 offsets.
 *
 * Values are taken as differences from the first and means are computed before squares, so that values far from
 * zero keep their digits. `sumOfSquares`, by default of the values themselves, sets what counts as rounding; for
 * residuals give that of the response. Null where no subject repeats.
 */
export function subjectAnova(
  values: Float64Array,
  start: Int32Array,
  sumOfSquares: number = squaresOf(values),
): SubjectAnova | null {
  const n = values.length;
  const g = start.length - 1;
  if (n === g) return null;
  const origin = values[0]!;
  let total = 0;
  for (let r = 0; r < n; r++) total += (values[r]! - origin) / n;
  let between = 0;
  let within = 0;
  let squaredCounts = 0;
  for (let i = 0; i < g; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    const count = to - from;
    let mean = 0;
    for (let r = from; r < to; r++) mean += (values[r]! - origin) / count;
    for (let r = from; r < to; r++) {
      const d = values[r]! - origin - mean;
      within += d * d;
    }
    between += count * (mean - total) ** 2;
    squaredCounts += count * count;
  }
  const floor = (ROUNDING * sumOfSquares) / n;
  const msb = between / (g - 1);
  const msw = within / (n - g);
  return {
    msb: msb <= floor ? 0 : msb,
    msw: msw <= floor ? 0 : msw,
    n0: (n - squaredCounts / n) / (g - 1),
    dfBetween: g - 1,
    dfWithin: n - g,
  };
}

export interface IccInterval {
  readonly estimate: number;
  readonly lower: number;
  readonly upper: number;
}

/**
 * The intraclass correlation (MSB − MSW)/(MSB + (n0 − 1)MSW) with Searle's 95 % interval (Donner 1986): exact for
 * balanced normal values, approximate else. It may be negative. Identical repeats give 1 with limits 1; null where
 * all values agree.
 */
export function anovaIcc(anova: SubjectAnova): IccInterval | null {
  const { msb, msw, n0, dfBetween, dfWithin } = anova;
  if (msw === 0) return msb === 0 ? null : { estimate: 1, lower: 1, upper: 1 };
  const f = msb / msw;
  const ofRatio = (ratio: number) => (ratio - 1) / (ratio + n0 - 1);
  return {
    estimate: ofRatio(f),
    lower: ofRatio(f / fQuantile(0.975, dfBetween, dfWithin)),
    upper: ofRatio(f * fQuantile(0.975, dfWithin, dfBetween)),
  };
}

/** The design effect of the mean, 1 + (ñ − 1)·ICC with ñ = Σn_i²/N (Kish 1965); may be ≤ 0 with a negative ICC. */
export function designEffect(icc: number, start: Int32Array): number {
  const g = start.length - 1;
  const n = start[g]!;
  let squared = 0;
  for (let i = 0; i < g; i++) squared += (start[i + 1]! - start[i]!) ** 2;
  return 1 + (squared / n - 1) * icc;
}
