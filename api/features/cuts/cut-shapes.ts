/** What a cut is put together from, and what it is made of. */
import type { SubjectState } from '../../contracts/subjects.ts';

export interface PlannedVisitOfCut {
  id: string;
  name: string;
  targetDay: number;
  windowAfter: number;
}

export interface VisitOfCut {
  id: string;
  /** null: unscheduled. */
  plannedVisitId: string | null;
  date: string | null;
  /** A partial date keeps its first possible day in `date`. */
  precision: 'day' | 'month' | 'year';
}

export interface ReadingOfCut {
  /** null: read once per subject. */
  visitId: string | null;
  measure: string;
  replicate: number;
  value: number | null;
  choice: string | null;
  limitSign: '<' | '>' | null;
  limitValue: number | null;
  notDone: string | null;
  enteredAt: string;
  /** The calendar day of entry at the subject's site. */
  enteredDay: string;
}

export interface SubjectOfCut {
  uid: string;
  code: string;
  site: string;
  group: string | null;
  baselineDate: string | null;
  state: SubjectState;
  stateDate: string | null;
  /** In order of entry. */
  visits: readonly VisitOfCut[];
  readings: readonly ReadingOfCut[];
}

export interface ExclusionOfCut {
  /** null: every measure. */
  measure: string | null;
  /** null: every visit. */
  visit: string | null;
  reason: string;
}

export interface CutPlan {
  visitCutoff: string;
  lateDays: number;
  plannedVisits: readonly PlannedVisitOfCut[];
  measures: readonly { shortName: string; per: 'visit' | 'subject' }[];
}

export interface CutCell {
  text: string;
  note: string;
}

export interface CutRow {
  subject: string;
  site: string;
  visit: string;
  planned: boolean;
  day: number | null;
  plannedDay: number | null;
  replicate: number;
  group: string | null;
  cells: Map<string, CutCell>;
}

export interface LateReading {
  subjectCode: string;
  visit: string;
  measure: string;
  visitDate: string;
  enteredAt: string;
  days: number;
}

export interface PendingVisit {
  subjectCode: string;
  visit: string;
  windowClosed: string;
}

export interface RowsOfSubject {
  rows: CutRow[];
  readings: number;
  late: LateReading[];
  pending: PendingVisit[];
}
