import type { Reason, ReasonCode } from '../errors.ts';
import type { DropReason } from '../table/long-table.ts';
import { named } from './numbers.ts';

/** English of every reason why a number is null. */
export const reasonWords: Record<ReasonCode, (subjects: readonly string[]) => string> = {
  no_repeats: () => 'No subject has two readings.',
  no_residual_variance: () => 'The readings lie on the line: there is no residual variance.',
  constant_response: () => 'All readings have the same value.',
  identical_repeats: () => "Each subject's readings are identical.",
  design_effect_not_positive: () => 'The design effect is not above zero.',
  moulton_not_positive: () => 'The factor would be the root of a number not above zero.',
  one_time_per_subject: () => 'No subject has readings at two different times.',
  too_many_pairs: () => 'There are too many pairs of readings within subjects to list.',
  leverage_one: (subjects) =>
    `Readings of subject ${named(subjects)} alone fix a direction of the model.`,
  fixed_by_subject: (subjects) =>
    `Subject ${named(subjects)} alone fixes this coefficient, so its error is too small.`,
  no_df: () => 'No degrees of freedom are left for the error.',
  zero_error: () => 'The error is zero.',
  unbounded: () => 'The interval has no limit on this side.',
  too_few_for_own_error: () => 'Fewer than three readings.',
  no_own_lines: () => 'No subject has a line of its own.',
  one_own_line: () => 'Only one subject has a line of its own.',
  no_line_df: () => 'No subject with a line has more than two readings.',
  joint_test_singular: () => 'The covariance of the slope differences is singular.',
  two_levels_only: () => 'With two levels the coefficient time_by_group is the test.',
  too_few_for_split: () => 'There are too few readings for two slopes.',
  same_mean_times: () => 'All subjects have the same mean time.',
  left_out: () => 'Left out on request.',
  locked: () => 'Locked; see ols_locked.',
  open_no_repeats: () => 'Not locked: no subject repeats.',
  open_acknowledged: () => 'Opened by an acknowledgement.',
  no_group: () => 'No group is in use.',
  no_source: () => 'The readings did not come from a file.',
  not_fitted_serial: () => 'Fits with serial correlation are not part of this version.',
  not_fitted_mixed: () => 'Mixed models are not part of this version.',
  not_fitted_gee: () => 'Estimating equations are not part of this version.',
  not_checked_assumptions: () => 'Checks of further assumptions are not part of this version.',
};

/** A reason in English. */
export function reasonText(reason: Reason): string {
  return reasonWords[reason.code](reason.subjects ?? []);
}

/** English of why a row is not used. */
export const dropWords: Record<DropReason, string> = {
  no_subject: 'no subject',
  no_time: 'no time',
  no_response: 'no response',
  no_group: 'no group',
};
