import { type ClusterContrast, clusterContrast } from '../cluster/cluster-line.ts';
import { jointTest } from '../cluster/joint-test.ts';
import { type WildBootstrap, wildBootstrap } from '../cluster/wild-bootstrap.ts';
import { known, type Maybe, notKnown, type ReasonCode } from '../errors.ts';
import type { MeanModel } from './mean-model.ts';
import { nullable, orReason } from './nullable.ts';
import type { GroupTestBlock, PooledCoefficient, WildBlock } from './result.ts';

/** The cluster-robust account of every coefficient, in the order of the model's columns. */
export function robustContrasts(model: MeanModel): ClusterContrast[] {
  return model.directions.map((h, k) => clusterContrast(model.basis, h, model.fit.beta[k]!));
}

/** Subjects that alone fix a direction of the model, by code. */
export function fixingSubjects(model: MeanModel): string[] {
  return codesOf(model, model.basis.fixing);
}

function codesOf(model: MeanModel, indices: readonly number[]): string[] {
  return indices.map((i) => model.table.subjects[i]!);
}

function coefficientBlock(model: MeanModel, contrast: ClusterContrast): PooledCoefficient {
  const { errors } = contrast;
  const fixed = contrast.fixedBy.length > 0 ? codesOf(model, contrast.fixedBy) : undefined;
  let why: ReasonCode = model.fit.hasVariance ? 'zero_error' : 'no_residual_variance';
  if (contrast.df === null) why = 'no_df';
  if (fixed) why = 'fixed_by_subject';
  const noT: ReasonCode = model.fit.hasVariance ? 'zero_error' : 'no_residual_variance';
  return {
    estimate: contrast.estimate,
    se_cr0: errors.cr0,
    se_cr1: errors.cr1,
    se_cr1s: errors.cr1s,
    se_cr2: errors.cr2,
    ...nullable('se_cr3', orReason(errors.cr3, 'leverage_one', fixingSubjects(model))),
    ...nullable('df', orReason(contrast.df, 'no_df')),
    ...nullable('t', orReason(contrast.t, noT)),
    ...nullable('p', orReason(contrast.p, why, fixed)),
    ...nullable('lower', orReason(contrast.lower, why, fixed)),
    ...nullable('upper', orReason(contrast.upper, why, fixed)),
  };
}

/** `pooled.coefficients`: every coefficient with its cluster-robust errors. */
export function pooledCoefficients(
  model: MeanModel,
  contrasts: readonly ClusterContrast[],
): Record<string, PooledCoefficient> {
  return Object.fromEntries(
    contrasts.map((contrast, k) => [model.fit.names[k]!, coefficientBlock(model, contrast)]),
  );
}

function wildBlock(wild: WildBootstrap): WildBlock {
  return {
    t: wild.t,
    p: wild.p,
    ...nullable('lower', orReason(wild.lower, 'unbounded')),
    ...nullable('upper', orReason(wild.upper, 'unbounded')),
    draws: wild.draws,
    weights: wild.weights,
    ...(wild.webbP === null ? {} : { webb_p: wild.webbP }),
  };
}

/** `pooled.wild_bootstrap`: every coefficient but the intercept. */
export function wildBlocks(
  model: MeanModel,
  draws: number,
  seed: number,
): Maybe<Record<string, WildBlock>> {
  if (model.structure.subjectsWithRepeats === 0) return notKnown('no_repeats');
  if (!model.fit.hasVariance) return notKnown('no_residual_variance');
  const blocks: [string, WildBlock][] = [];
  for (let k = 1; k < model.fit.p; k++) {
    const wild = wildBootstrap(model.basis, model.directions[k]!, model.fit.beta[k]!, draws, seed);
    if (!wild) return notKnown('zero_error');
    blocks.push([model.fit.names[k]!, wildBlock(wild)]);
  }
  return known(Object.fromEntries(blocks));
}

/** `pooled.group_test`: all slope differences together, with more than two levels. */
export function groupTest(model: MeanModel): Maybe<GroupTestBlock> {
  const { levels } = model.table;
  if (!levels) return notKnown('no_group');
  if (levels.length === 2) return notKnown('two_levels_only');
  if (!model.fit.hasVariance) return notKnown('no_residual_variance');
  const first = levels.length + 1;
  const fixing = fixingSubjects(model);
  if (fixing.length > 0) return notKnown('leverage_one', fixing);
  const test = jointTest(model.basis, model.directions.slice(first), model.fit.beta.slice(first));
  return test
    ? known({ f: test.f, df1: test.df1, df2: test.df2, p: test.p })
    : notKnown('joint_test_singular');
}
