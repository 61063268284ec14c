/** What each of the six parts of the check is given. */
import type { CheckView } from '../../../api/contracts/analysis.ts';
import type { Question } from '../../app/specification-address.ts';

export type PartProps = {
  check: CheckView;
  question: Question;
  /** Cut, specification, engine and seed: what files of the pictures keep. */
  source: string;
  groups: readonly string[];
  picked: string | null;
  onPick: (id: string | null) => void;
};
