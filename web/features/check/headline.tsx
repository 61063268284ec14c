/** The warning: how many readings, of how many subjects, and what they are worth. */
import type { CheckView } from '../../../api/contracts/analysis.ts';
import { words } from '../../words/en.ts';

const text = words.check;

export function headingOf({ structure, independence }: CheckView) {
  if (!independence.warn) return text.single(structure.readings, structure.subjects);
  return (
    <>
      {text.readings(structure.readings)}
      <span className="text-flare-ink">{text.notIndependent(structure.readings)}</span>
    </>
  );
}

export function sentenceOf({ structure, independence }: CheckView) {
  const { verdict, effective_n: effective, icc_residual: icc } = independence;
  if (verdict === 'no_repeats') return text.designOnly;
  const from = text.comeFrom(structure.subjects, structure.subjects_with_repeats);
  if (verdict === 'repeats_none_detected') return `${from} ${text.quiet(structure.subjects)}`;
  if (effective === null || icc === null) return from;
  return (
    <>
      {from} {text.carry}
      <strong className="text-ink">{text.independentReadings(Math.round(effective))}</strong>
      {text.icc(icc)}
    </>
  );
}
