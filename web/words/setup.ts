/** The set-up of a study, read only. */
import { counted, formatNumber } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

export const setupWords = {
  heading: 'Set-up',
  sentence: (masked: boolean) =>
    `${masked ? 'This study is masked.' : 'This study is not masked.'} The set-up is read here; it was made from a file when the study began.`,
  study: 'Study',
  name: 'Name',
  shortName: 'Short name',
  state: 'State',
  states: { open: 'open', locked: 'locked', closed: 'closed' },
  masking: 'Masking',
  masked: 'masked: who is in which arm is sealed away',
  notMasked: 'not masked: arms are open to members',
  closing: 'A window counts as closing',
  closingDays: (days: number) => `in its last ${counted(days, 'day', 'days')}`,
  late: 'A reading counts as late',
  lateDays: (days: number) => `more than ${counted(days, 'day', 'days')} after its visit`,
  sites: 'Sites',
  siteNoun: ['site', 'sites'],
  code: 'Code',
  timeZone: 'Time zone',
  arms: 'Arms',
  armsSentence:
    'Their names stand in the protocol. Who is in which is on no page of a masked study.',
  noArms: 'Nothing is compared in this study: it has no arms.',
  measures: 'Measures',
  measureNoun: ['measure', 'measures'],
  label: 'Measure',
  unit: 'Unit',
  nature: 'Kind of response',
  natures: {
    continuous: 'continuous',
    positive: 'positive and skewed',
    count: 'count',
    yes_no: 'yes or no',
    choice: 'choice',
  },
  per: 'Taken',
  pers: { visit: 'each visit', subject: 'once per subject' },
  decimals: 'Decimals',
  plausible: 'Plausible',
  impossible: 'Possible',
  alert: 'Alert',
  concern: 'Harm lies',
  concerns: { high: 'above', low: 'below', both: 'above and below' },
  choices: 'Choices',
  range: (low: number | null, high: number | null, decimals: number) => {
    if (low === null && high === null) return '';
    if (low === null) return `up to ${formatNumber(high, decimals)}`;
    if (high === null) return `from ${formatNumber(low, decimals)}`;
    return `${formatNumber(low, decimals)} to ${formatNumber(high, decimals)}`;
  },
  alertRange: (low: number | null, high: number | null, decimals: number) =>
    [
      low === null ? '' : `below ${formatNumber(low, decimals)}`,
      high === null ? '' : `above ${formatNumber(high, decimals)}`,
    ]
      .filter(Boolean)
      .join(', '),
  schedule: 'Schedule of visits',
  scheduleSentence: 'Days count from baseline, which is day 0.',
  visitNoun: ['planned visit', 'planned visits'],
  visit: 'Visit',
  targetDay: 'Target day',
  window: 'Window, days',
  windowOf: (from: number, to: number) =>
    from === to ? `${formatNumber(from)} only` : `${formatNumber(from)} to ${formatNumber(to)}`,
} as const;

export const setupProblems: ProblemSentences = {
  setup_study_exists:
    'A study with the short name “{shortName}” exists already. Choose another short name.',
  setup_file_invalid: 'The set-up file can’t be used as it stands. Nothing was made.',
  first_owner_same:
    'The administrator and the owner have the same address. An administrator never sees study data: give two accounts.',
  allocation_not_here: 'The allocation is entered by the unblinded statistician only.',
  allocation_row_unknown:
    'Row {row} of the list names a subject or an arm that the study does not have.',
  allocation_twice: 'Row {row} of the list names a subject that is listed already.',
};
