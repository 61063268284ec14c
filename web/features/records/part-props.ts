/** What each part of a record's page is given. */
import type { RecordDetail } from '../../../api/contracts/analysis.ts';

export type RecordPartProps = {
  record: RecordDetail;
  /** What files of the pictures keep of the record. */
  source: string;
  picked: string | null;
  onPick: (id: string | null) => void;
};
