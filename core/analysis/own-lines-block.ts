import type { ReasonCode } from '../errors.ts';
import { type OwnLines, summariseSlopes } from '../lines/own-lines.ts';
import type { Structure } from '../table/structure.ts';
import { notFittedWords } from '../words/en.ts';
import { nullable, orReason } from './nullable.ts';
import type { OwnLineBlock, OwnLinesBlock } from './result.ts';

/** `per_subject`: every subject's own line, and the two-stage summary of their slopes. */
export function ownLinesBlock(
  own: OwnLines,
  subjects: readonly string[],
  structure: Structure,
): OwnLinesBlock {
  const variance = own.residualVariance;
  const lines: OwnLineBlock[] = own.lines.map((line) => ({
    subject: subjects[line.subject]!,
    n: line.n,
    intercept: line.intercept,
    slope: line.slope,
    ...nullable('slope_se', orReason(line.slopeSe, 'too_few_for_own_error')),
    ...nullable(
      'slope_se_pooled',
      orReason(variance === null ? null : Math.sqrt(variance / line.sxx), 'no_line_df'),
    ),
  }));
  const summary = summariseSlopes(own.lines);
  const noMean: ReasonCode = structure.subjectsWithRepeats === 0 ? 'no_repeats' : 'no_own_lines';
  const noSpread: ReasonCode = own.lines.length === 1 ? 'one_own_line' : noMean;
  return {
    lines,
    not_fitted: own.notFitted.map(({ subject, reason }) => ({
      subject: subjects[subject]!,
      reason: notFittedWords[reason],
      code: reason,
    })),
    ...nullable('mean_slope', orReason(summary.mean, noMean)),
    ...nullable('sd_slope', orReason(summary.sd, noSpread)),
    ...nullable('mean_slope_lower', orReason(summary.lower, noSpread)),
    ...nullable('mean_slope_upper', orReason(summary.upper, noSpread)),
    ...nullable('weighted_mean_slope', orReason(summary.weightedMean, noMean)),
  };
}
