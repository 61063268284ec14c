import type { ReasonCode } from '../errors.ts';
import { type SubjectAnova, subjectAnova } from '../independence/anova-icc.ts';
import type { MeanModel } from './mean-model.ts';
import type { Observe } from './timed-parts.ts';

/** What each part of the check rests on, and why parts of it can't be given. */
export interface CheckBase {
  readonly model: MeanModel;
  readonly draws: number;
  readonly seed: number;
  readonly observe: Observe;
  readonly anova: SubjectAnova | null;
  /** Why a part that needs repeats and residual variance is left out; null where it can be given. */
  readonly without: ReasonCode | null;
  /** The same for parts that divide by the variance within subjects. */
  readonly withoutWithin: ReasonCode | null;
}

function sumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (let r = 0; r < values.length; r++) sum += values[r]! * values[r]!;
  return sum;
}

/** Looks once at what the whole check depends on. */
export function checkBase(
  model: MeanModel,
  draws: number,
  seed: number,
  observe: Observe,
): CheckBase {
  const { fit, table } = model;
  const anova = subjectAnova(fit.residuals, table.start, sumOfSquares(table.response));
  let without: ReasonCode | null = null;
  if (!anova) without = 'no_repeats';
  else if (!fit.hasVariance) without = 'no_residual_variance';
  const identical = without === null && anova?.msw === 0;
  return {
    model,
    draws,
    seed,
    observe,
    anova,
    without,
    withoutWithin: identical ? 'identical_repeats' : without,
  };
}
