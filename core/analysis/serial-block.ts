import { known, type Maybe, notKnown } from '../errors.ts';
import { permuteWithinSubjects } from '../independence/permutation.ts';
import { medianGap, successiveCorrelation } from '../independence/serial.ts';
import type { CheckBase } from './check-base.ts';
import { allNull, nullable, orReason } from './nullable.ts';
import type { PermutationBlock, SerialBlock } from './result.ts';

/** `independence.serial`: the correlation of successive residuals within subjects, judged by shuffling them. */
export function serialBlock(base: CheckBase): Maybe<SerialBlock> {
  const { model, withoutWithin, draws, seed } = base;
  const { start, time } = model.table;
  if (base.without === 'no_repeats') return notKnown('no_repeats');
  const found = withoutWithin ? null : successiveCorrelation(model.fit.residuals, start);
  const why = withoutWithin ?? 'identical_repeats';
  const permutation: Maybe<PermutationBlock> = found
    ? known({
        statistic: found.lag1,
        p: base.observe('permutation', () =>
          permuteWithinSubjects(model.fit.residuals, start, draws, seed),
        ),
        draws,
      })
    : notKnown(why);
  return known({
    ...nullable('lag1', orReason(found ? found.lag1 : null, why)),
    ...nullable('lag1_expected', orReason(found ? found.expected : null, why)),
    ...nullable('permutation', permutation),
    ...nullable('phi', notKnown<number>('not_fitted_serial')),
    ...nullable('median_gap', orReason(medianGap(time, start), 'one_time_per_subject')),
    on_means: false,
    ...allNull(['loglik', 'aic', 'bic'], 'not_fitted_serial'),
  });
}
