/** Words of the pages of cuts. */
import { counted, formatCount } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

export const cutsWords = {
  heading: (total: number) =>
    total === 0 ? 'No cut is frozen yet' : `${counted(total, 'cut is', 'cuts are')} frozen`,
  sentence: 'Analyses read cuts only. A frozen cut never changes; later data make a new one.',
  empty:
    'A cut is the readings of the study up to a visit day, as they stand at this moment: counted, hashed and kept as they are.',
  emptyOwner: 'Nothing has been frozen. An analyst of the study freezes cuts.',
  freezeLink: 'Freeze a cut',
  caption: 'Cuts of the study',
  noun: ['cut', 'cuts'],
  search: 'Name',
  columns: {
    number: 'Cut',
    name: 'Name',
    visitCutoff: 'Visits to',
    frozenAt: 'Frozen',
    frozenBy: 'By',
    measures: 'Measures',
    rows: 'Rows',
    subjects: 'Subjects',
    late: 'Late',
    pending: 'Pending',
    sha256: 'Hash, first 12',
  },

  freezeForbidden: 'Analysts of the study freeze cuts. Ask its owner for that role.',
  freezeHeading: 'Freeze a cut',
  freezeSentence:
    'A frozen cut can’t be changed or removed. Readings entered later make a new cut, with its difference to this one.',
  name: 'Name',
  nameHint: 'Such as “second interim”. It stands on every analysis of this cut.',
  visitCutoff: 'Visits up to and including',
  visitCutoffHint: 'Entry time is the moment of freezing.',
  measures: 'Measures',
  oncePerSubject: 'once per subject',
  withdrawn: 'Readings gathered before a withdrawal of consent',
  withdrawnHint: (readings: number, subjects: number) =>
    `${counted(readings, 'reading', 'readings')} of ${counted(subjects, 'subject', 'subjects')} who withdrew consent.`,
  leaveOut: 'Leave them out',
  include: 'Include them, with a reason',
  includeReason: 'Why they are included',
  includeReasonHint: 'Such as the section of the protocol that allows it.',
  exclusions: 'Exclusions',
  exclusionsHint:
    'Readings left out by decision. Each needs a reason, which stays on the cut; excluded readings show it in the file. Never name a participant in it.',
  addExclusion: 'Add an exclusion',
  removeExclusion: (number: number) => `Remove exclusion ${number}`,
  exclusion: (number: number) => `Exclusion ${number}`,
  subjectCode: 'Subject code',
  excludedMeasure: 'Measure',
  excludedVisit: 'Visit',
  wholeSubject: 'all measures',
  everyVisit: 'Empty: every visit of the subject.',
  reason: 'Reason',
  freeze: 'Freeze this cut',
  freezing: 'Freezing the cut.',
  frozen: (number: number) => `Cut ${number} is frozen.`,
  needsReason: 'Write why they are included, in 5 characters or more.',

  previewHeading: 'What this cut would hold now',
  previewWaiting: 'Choose a day and at least one measure.',
  rows: 'Rows: visits due or taken',
  subjects: 'Subjects',
  readings: 'Readings',
  late: (days: number) => `Late: entered more than ${formatCount(days)} days after their visit`,
  pending: 'Pending: visits due without an outcome',
  lateShort: 'Late readings',
  pendingShort: 'Pending visits',

  cutHeading: (number: number, name: string, day: string) =>
    `Cut ${number}, ${name}: visits to ${day}`,
  cutSentence: (rows: number, subjects: number) =>
    `${counted(rows, 'row', 'rows')} of ${counted(subjects, 'subject', 'subjects')}, frozen. Every analysis of this cut reads exactly these bytes.`,
  contentHeading: 'What it holds',
  enteredUntil: 'Entered until',
  frozenBy: 'Frozen by',
  hash: 'Hash of the file (SHA-256)',
  withdrawnLeftOut: 'Before withdrawal of consent',
  withdrawnNone: 'no such readings',
  withdrawnOut: (readings: number, subjects: number) =>
    `${counted(readings, 'reading', 'readings')} of ${counted(subjects, 'subject', 'subjects')} left out`,
  withdrawnIn: (reason: string) => `included: ${reason}`,
  exclusionsNone: 'none',
  exclusionLine: (code: string, what: string, reason: string) => `${code}, ${what}: ${reason}`,
  exclusionWhat: (measure: string | null, visit: string | null) =>
    `${measure ?? 'all measures'}${visit ? ` at ${visit}` : ''}`,
  download: 'Download the file (CSV)',
  downloadFailed: 'The file could not be read. Nothing was saved.',
  checkLink: 'Check this cut',
  differenceHeading: (number: number) => `Against cut ${number}`,
  differenceSentence: (number: number, name: string) =>
    `Rows of cut ${number}, ${name}, and of this cut, by subject, visit and replicate.`,
  first: 'This is the first cut of the study: there is none before it.',
  added: 'Rows added',
  changed: 'Rows changed',
  gone: 'Rows gone',
  lateHeading: (count: number) =>
    count === 0
      ? 'No reading was entered late'
      : `${counted(count, 'reading was', 'readings were')} entered late`,
  lateCaption: 'Readings entered late',
  lateNoun: ['reading', 'readings'],
  pendingHeading: (count: number) =>
    count === 0 ? 'No visit is pending' : `${counted(count, 'visit is', 'visits are')} pending`,
  pendingSentence: 'Their windows had closed by the cutoff and nothing was logged.',
  pendingCaption: 'Visits due without an outcome',
  pendingNoun: ['visit', 'visits'],
  lateColumns: {
    subject: 'Subject',
    visit: 'Visit',
    measure: 'Measure',
    visitDate: 'Visit day',
    enteredAt: 'Entered',
    days: 'After, days',
  },
  pendingColumns: { subject: 'Subject', visit: 'Visit', windowClosed: 'Window closed' },
} as const;

export const cutsProblems: ProblemSentences = {
  cut_day_invalid: '{day} is not a day of the calendar. Choose the last visit day of the cut.',
  cut_in_future:
    'The visit cutoff {day} lies in the future; today is {today}. Choose today or an earlier day.',
  cut_measure_unknown: 'This study has no measure {measure}. Choose measures of the list.',
  cut_needs_visit_measure:
    'All chosen measures are read once per subject, so no visit would have a row. Add a measure that is read at visits.',
  cut_exclusion_unknown:
    'Exclusion {row} names {value}, which this cut does not hold. Correct it, or remove the exclusion.',
  cut_nothing_to_freeze:
    'No reading was due or taken by {day}, so there is nothing to freeze. Choose a later day or other measures.',
};
