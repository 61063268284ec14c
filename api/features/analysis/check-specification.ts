/** Whether a specification can be asked of a cut at all; each refusal says what to choose instead. */
import type { SpecificationInput } from '../../contracts/analysis.ts';
import { fillSentence, Problem } from '../../http/problems.ts';
import { analysisProblems } from '../../words/analysis.ts';
import type { CutMeasure, StoredCut } from '../cuts/cut-repository.ts';

type Code = keyof typeof analysisProblems;

/**
 * @param masked whether the study is masked now
 * @throws Problem analysis_measure_…, analysis_group_…; none of them names a group
 */
export function checkSpecification(
  cut: Pick<StoredCut, 'measures' | 'groups'>,
  input: SpecificationInput,
  masked: boolean,
): CutMeasure {
  const measure = cut.measures.find((one) => one.shortName === input.measure);
  if (measure === undefined) {
    throw fault('analysis_measure_unknown', 'measure', { measure: input.measure });
  }
  const params = { measure: measure.shortName };
  if (measure.per === 'subject') {
    throw fault('analysis_measure_once', 'measure', params);
  }
  if (measure.nature === 'yes_no') {
    throw fault('analysis_measure_yes_no', 'measure', params);
  }
  if (measure.nature === 'choice') {
    throw fault('analysis_measure_choice', 'measure', params);
  }
  if (input.group && masked) {
    throw fault('analysis_group_masked', 'group', {});
  }
  if (input.group && cut.groups.length === 0) {
    throw fault('analysis_group_none', 'group', {});
  }
  return measure;
}

function fault(code: Code, field: string, params: Record<string, string>): Problem {
  const message = fillSentence(analysisProblems[code].detail, params);
  return new Problem(code, params, { errors: [{ path: `specification.${field}`, message }] });
}
