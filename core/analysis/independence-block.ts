import type { ClusterContrast } from '../cluster/cluster-line.ts';
import { known, type Maybe, notKnown, type ReasonCode } from '../errors.ts';
import {
  anovaIcc,
  designEffect,
  type IccInterval,
  type SubjectAnova,
  subjectAnova,
} from '../independence/anova-icc.ts';
import { type BoundaryTest, interceptTest } from '../independence/likelihood-ratio.ts';
import { moultonFactor } from '../independence/moulton.ts';
import { permuteOverSubjects } from '../independence/permutation.ts';
import { MOST_PAIRS, pairsWithin, sampleVariogram } from '../independence/variogram.ts';
import { verdictOf } from '../independence/verdict.ts';
import { ordinaryError } from '../linear/fit-ols.ts';
import { fitRandomIntercept } from '../mixed/fit-random-intercept.ts';
import { headlineText } from '../words/en.ts';
import { type CheckBase, checkBase } from './check-base.ts';
import type { MeanModel } from './mean-model.ts';
import { nullable } from './nullable.ts';
import type {
  ByCoefficient,
  IndependenceBlock,
  PermutationBlock,
  VariogramBlock,
} from './result.ts';
import { serialBlock } from './serial-block.ts';
import type { Observe } from './timed-parts.ts';

function iccOf(anova: SubjectAnova | null, none: ReasonCode): Maybe<IccInterval> {
  if (!anova) return notKnown('no_repeats');
  const icc = anovaIcc(anova);
  return icc ? known(icc) : notKnown(none);
}

function permutationOf(base: CheckBase): Maybe<PermutationBlock> {
  const { anova, model, draws, seed } = base;
  if (base.withoutWithin || !anova) return notKnown(base.withoutWithin ?? 'no_repeats');
  const p = base.observe('permutation', () =>
    permuteOverSubjects(model.fit.residuals, model.table.start, draws, seed),
  );
  return known({ statistic: anova.msb / anova.msw, p, draws });
}

function likelihoodRatio({ model, withoutWithin }: CheckBase): Maybe<BoundaryTest> {
  if (withoutWithin) return notKnown(withoutWithin);
  return known(interceptTest(fitRandomIntercept(model.fit, model.table.start)));
}

function variogramOf({ model }: CheckBase): Maybe<VariogramBlock> {
  const { start, time } = model.table;
  if (pairsWithin(start) > MOST_PAIRS) return notKnown('too_many_pairs');
  const variogram = sampleVariogram(model.fit.residuals, time, start);
  if (!variogram) return notKnown('no_repeats');
  return known({
    bins: variogram.bins.map(({ lag, value, pairs }) => ({ lag, value, pairs })),
    total: variogram.total,
  });
}

/** se(CR2)/se(OLS) of each coefficient. */
export function seRatios(model: MeanModel, contrasts: readonly ClusterContrast[]): ByCoefficient {
  const ratios: ByCoefficient = {};
  contrasts.forEach((contrast, k) => {
    const ordinary = ordinaryError(model.fit, model.directions[k]!);
    const value: Maybe<number> = model.fit.hasVariance
      ? known(contrast.errors.cr2 / ordinary)
      : notKnown('no_residual_variance');
    Object.assign(ratios, nullable(model.fit.names[k]!, value));
  });
  return ratios;
}

function moultonOf({ model }: CheckBase, icc: Maybe<IccInterval>): Maybe<ByCoefficient> {
  if (!icc.known) return icc;
  const factors: ByCoefficient = {};
  model.directions.forEach((h, k) => {
    const factor = moultonFactor(model.fit, model.table.start, h, icc.value.estimate);
    const value = factor === null ? notKnown<number>('moulton_not_positive') : known(factor);
    Object.assign(factors, nullable(model.fit.names[k]!, value));
  });
  return known(factors);
}

/** `independence`: the structure's warning, the amount and the type of dependence, and what it does to errors. */
export function independenceBlock(
  model: MeanModel,
  contrasts: readonly ClusterContrast[],
  draws: number,
  seed: number,
  observe: Observe,
): IndependenceBlock {
  const base = checkBase(model, draws, seed, observe);
  const { anova, without } = base;
  const { start, response } = model.table;
  const icc: Maybe<IccInterval> = without
    ? notKnown(without)
    : iccOf(anova, 'no_residual_variance');
  const effect = icc.known ? known(designEffect(icc.value.estimate, start)) : icc;
  const usable =
    effect.known && effect.value <= 0 ? notKnown<number>('design_effect_not_positive') : effect;
  const ratio = likelihoodRatio(base);
  const repeats = model.structure.subjectsWithRepeats > 0;
  const verdict = verdictOf({
    repeats,
    identicalRepeats: base.withoutWithin === 'identical_repeats',
    pExchangeable: ratio.known ? ratio.value.p : null,
    iccUpper: icc.known ? icc.value.upper : null,
  });
  const headline = headlineText({
    structure: model.structure,
    verdict,
    icc: icc.known ? icc.value : null,
    judged: without === null,
  });
  const anovaValue: Maybe<{ msb: number; msw: number; n0: number }> = anova
    ? known({ msb: anova.msb, msw: anova.msw, n0: anova.n0 })
    : notKnown('no_repeats');
  return {
    verdict,
    warn: repeats,
    headline,
    ...nullable('icc_residual', icc),
    ...nullable('icc_response', iccOf(subjectAnova(response, start), 'constant_response')),
    ...nullable('anova', anovaValue),
    ...nullable('design_effect', usable),
    ...nullable('effective_n', usable.known ? known(model.fit.n / usable.value) : usable),
    ...nullable('lr_test', ratio.known ? known({ lr: ratio.value.lr, p: ratio.value.p }) : ratio),
    ...nullable('permutation', permutationOf(base)),
    ...nullable('serial', serialBlock(base)),
    ...nullable('variogram', variogramOf(base)),
    se_ratio: seRatios(model, contrasts),
    ...nullable('moulton', moultonOf(base, icc)),
  };
}
