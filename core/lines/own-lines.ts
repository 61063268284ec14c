import { studentQuantile } from '../distributions/student-t.ts';
import type { GroupedTable } from '../table/long-table.ts';

/** A subject's own straight line by least squares over its own readings. */
export interface OwnLine {
  /** Index of the subject. */
  readonly subject: number;
  readonly n: number;
  /** At time 0 of the user's scale. */
  readonly intercept: number;
  readonly slope: number;
  /** Own error of the slope on n − 2 df; null below three readings. */
  readonly slopeSe: number | null;
  /** Σ(t − t̄)² of the subject. */
  readonly sxx: number;
  /** Residual sum of squares of the own line. */
  readonly rss: number;
}

export type NotFittedReason = 'one_reading' | 'one_time';

/** Every subject's own line, and who has none. */
export interface OwnLines {
  /** In order of first appearance. */
  readonly lines: readonly OwnLine[];
  readonly notFitted: readonly { readonly subject: number; readonly reason: NotFittedReason }[];
  /** Σ(n_i − 2) over fitted subjects. */
  readonly residualDf: number;
  /** Pooled residual variance within lines; null without df. */
  readonly residualVariance: number | null;
}

function fitOwnLine(table: GroupedTable, subject: number, from: number, to: number): OwnLine {
  const { time, response } = table;
  const n = to - from;
  // Differences from the first reading keep digits when times or responses lie far from zero.
  const t0 = time[from]!;
  const y0 = response[from]!;
  let meanT = 0;
  let meanY = 0;
  for (let r = from; r < to; r++) {
    meanT += (time[r]! - t0) / n;
    meanY += (response[r]! - y0) / n;
  }
  let sxx = 0;
  let sxy = 0;
  for (let r = from; r < to; r++) {
    const dt = time[r]! - t0 - meanT;
    sxx += dt * dt;
    sxy += dt * (response[r]! - y0 - meanY);
  }
  const slope = sxy / sxx;
  let rss = 0;
  if (n > 2) {
    for (let r = from; r < to; r++) {
      const residual = response[r]! - y0 - meanY - slope * (time[r]! - t0 - meanT);
      rss += residual * residual;
    }
  }
  const intercept = y0 + meanY - slope * (t0 + meanT);
  const slopeSe = n > 2 ? Math.sqrt(rss / (n - 2) / sxx) : null;
  return { subject, n, intercept, slope, slopeSe, sxx, rss };
}

/** Times closer than this share of the largest one differ by rounding, not by waiting. */
const SAME_TIME = 1e-12;

function largestSize(values: Float64Array): number {
  let largest = 0;
  for (let k = 0; k < values.length; k++) largest = Math.max(largest, Math.abs(values[k]!));
  return largest;
}

/** Fits every subject's own line; a line needs two distinct times. */
export function ownLines(table: GroupedTable): OwnLines {
  const least = SAME_TIME * largestSize(table.time);
  const lines: OwnLine[] = [];
  const notFitted: { subject: number; reason: NotFittedReason }[] = [];
  let residualDf = 0;
  let rss = 0;
  table.subjects.forEach((_, subject) => {
    const from = table.start[subject]!;
    const to = table.start[subject + 1]!;
    // Times rise within a subject, so the ends tell whether they differ.
    if (to - from < 2) notFitted.push({ subject, reason: 'one_reading' });
    else if (table.time[to - 1]! - table.time[from]! <= least)
      notFitted.push({ subject, reason: 'one_time' });
    else {
      const line = fitOwnLine(table, subject, from, to);
      lines.push(line);
      residualDf += line.n - 2;
      rss += line.rss;
    }
  });
  return {
    lines,
    notFitted,
    residualDf,
    residualVariance: residualDf > 0 ? rss / residualDf : null,
  };
}

/** The two-stage summary of the own slopes. */
export interface SlopeSummary {
  /** Null without a line. */
  readonly mean: number | null;
  /** Divisor k − 1; null with fewer than two lines, as the limits are. */
  readonly sd: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  /** Mean weighted by Σ(t − t̄)², the inverse variances under one residual variance; null without a line. */
  readonly weightedMean: number | null;
}

/** Mean own slope with its t interval on k − 1 df, standard deviation, and inverse-variance weighted mean. */
export function summariseSlopes(lines: readonly OwnLine[]): SlopeSummary {
  const k = lines.length;
  const first = lines[0];
  if (!first) return { mean: null, sd: null, lower: null, upper: null, weightedMean: null };
  const origin = first.slope;
  let sum = 0;
  let weights = 0;
  let weighted = 0;
  for (const { slope, sxx } of lines) {
    sum += slope - origin;
    weights += sxx;
    weighted += sxx * (slope - origin);
  }
  const mean = origin + sum / k;
  const weightedMean = origin + weighted / weights;
  if (k < 2) return { mean, sd: null, lower: null, upper: null, weightedMean };
  let squares = 0;
  for (const { slope } of lines) squares += (slope - mean) ** 2;
  const sd = Math.sqrt(squares / (k - 1));
  const reach = (studentQuantile(0.975, k - 1) * sd) / Math.sqrt(k);
  return { mean, sd, lower: mean - reach, upper: mean + reach, weightedMean };
}
