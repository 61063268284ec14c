import type { ClusterContrast } from '../cluster/cluster-line.ts';
import type { OwnLines } from '../lines/own-lines.ts';
import {
  BOOTSTRAP_BELOW,
  bootstrapAdvice,
  ordinaryAdvice,
  ownLinesAdvice,
  pooledAdvice,
} from '../words/en.ts';
import type { MeanModel } from './mean-model.ts';
import { fixingSubjects } from './pooled-block.ts';
import type { Advice } from './result.ts';

/** From here on one subject's leverage, or the coefficient of variation of n_i, makes the fit uneven. */
const HIGH_LEVERAGE = 0.5;
const UNEVEN_COUNTS = 1;

function isUneven({ basis, structure, table }: MeanModel): boolean {
  if (basis.lambda.some((value) => value > HIGH_LEVERAGE)) return true;
  const mean = structure.readings / structure.subjects;
  let squares = 0;
  table.subjects.forEach((_, i) => {
    squares += (table.start[i + 1]! - table.start[i]! - mean) ** 2;
  });
  return Math.sqrt(squares / structure.subjects) > UNEVEN_COUNTS * mean;
}

function smallestDf(contrasts: readonly ClusterContrast[]): number | null {
  let smallest: number | null = null;
  for (const { df } of contrasts.slice(1)) {
    if (df === null) return null;
    if (smallest === null || df < smallest) smallest = df;
  }
  return smallest;
}

/** Which of the fits that exist suit this design and this number of subjects, best first. */
export function adviceOn(
  model: MeanModel,
  contrasts: readonly ClusterContrast[],
  own: OwnLines,
): Advice[] {
  const facts = {
    subjects: model.structure.subjects,
    readings: model.structure.readings,
    subjectsWithRepeats: model.structure.subjectsWithRepeats,
    ownLines: own.lines.length,
    df: smallestDf(contrasts),
    fixing: fixingSubjects(model),
    uneven: isUneven(model),
  };
  const advice: Advice[] = [pooledAdvice(facts)];
  if (facts.subjectsWithRepeats === 0) return [...advice, ordinaryAdvice()];
  if (own.lines.length > 0) advice.push(ownLinesAdvice(facts));
  const few = facts.df !== null && facts.df < BOOTSTRAP_BELOW;
  if ((few || facts.uneven) && model.fit.hasVariance) advice.push(bootstrapAdvice(facts));
  return advice;
}
