import { clusterBasis } from '../cluster/cluster-basis.ts';
import { type ClusterContrast, clusterContrast } from '../cluster/cluster-line.ts';
import { known, type Maybe, notKnown, type ReasonCode } from '../errors.ts';
import { covariateDesign } from '../linear/design.ts';
import { contrastDirection, fitOls } from '../linear/fit-ols.ts';
import { splitTime } from '../lines/within-between.ts';
import type { GroupedTable } from '../table/long-table.ts';
import type { Structure } from '../table/structure.ts';
import { nullable, orReason } from './nullable.ts';
import type { SplitSlope, WithinBetweenBlock } from './result.ts';

function slopeOf(contrast: ClusterContrast, table: GroupedTable, hasVariance: boolean): SplitSlope {
  const fixed = contrast.fixedBy.map((i) => table.subjects[i]!);
  let why: ReasonCode = hasVariance ? 'zero_error' : 'no_residual_variance';
  if (contrast.df === null) why = 'no_df';
  if (fixed.length > 0) why = 'fixed_by_subject';
  return {
    estimate: contrast.estimate,
    se_cr2: contrast.errors.cr2,
    ...nullable('df', orReason(contrast.df, 'no_df')),
    ...nullable('p', orReason(contrast.p, why, fixed)),
  };
}

/**
 * `within_between`: the slope within subjects and between subject means from one fit of y on t − t̄_i and t̄_i, and
 * their difference, between − within, as a contrast of that fit; errors by CR2. The group is not used.
 */
export function withinBetween(
  table: GroupedTable,
  structure: Structure,
): Maybe<WithinBetweenBlock> {
  if (structure.subjectsWithRepeats === 0) return notKnown('no_repeats');
  const split = splitTime(table);
  if (!split.hasWithin) return notKnown('one_time_per_subject');
  const covariates = [{ name: 'within', x: split.within }];
  if (split.hasBetween) covariates.push({ name: 'between', x: split.between });
  if (structure.readings <= covariates.length + 1) return notKnown('too_few_for_split');
  const fit = fitOls(covariateDesign(covariates), table.response);
  const basis = clusterBasis(fit, table.start);
  const slope = (contrast: readonly number[]) => {
    let estimate = 0;
    for (let k = 0; k < fit.p; k++) estimate += contrast[k]! * fit.beta[k]!;
    const found = clusterContrast(basis, contrastDirection(fit, contrast), estimate);
    return slopeOf(found, table, fit.hasVariance);
  };
  const none = notKnown<SplitSlope>('same_mean_times');
  const between = split.hasBetween ? known(slope([0, 0, 1])) : none;
  const difference = split.hasBetween ? known(slope([0, -1, 1])) : none;
  return known({
    within: slope(split.hasBetween ? [0, 1, 0] : [0, 1]),
    ...nullable('between', between),
    ...nullable('difference', difference),
  });
}
