/** Import of files of readings: upload, mapping, dry run, what was written. */
import { counted, formatCount } from './numbers.ts';
import type { ProblemParams, ProblemSentences } from './problems.ts';

const readings = (count: number) => counted(count, 'reading', 'readings');
const rows = (count: number) => counted(count, 'row', 'rows');

export const importWords = {
  heading: 'Import readings',
  sentence:
    'One file holds the readings of one measure, a row each. Nothing is written before you have seen a dry run.',
  uploadHeading: 'Upload a file',
  measure: 'Measure',
  measureHint: 'What the values of the file are readings of.',
  noMeasures: 'This study has no measure to import. The owner sets them up.',
  file: 'File',
  fileHint:
    'CSV with a header line, UTF-8; comma, semicolon or tab between the columns. At most 200 MB.',
  fileMissing: 'Choose a file.',
  upload: 'Upload and look at it',
  uploading: 'Uploading',
  listHeading: 'Your imports',
  listSentence: 'Files you uploaded, with what became of them.',
  caption: 'Your imports',
  noun: ['import', 'imports'],
  empty: 'You have not imported a file yet. Choose a measure and a file above.',
  name: 'File',
  state: 'State',
  uploaded: 'Uploaded',
  applied: 'Ended',
  rowsColumn: 'Rows',
  fresh: 'Written',
  refusedColumn: 'Refused',
  knownColumn: 'Known',
  states: {
    uploaded: 'uploaded',
    checking: 'dry run under way',
    checked: 'dry run done, not applied',
    applying: 'being written',
    applied: 'applied',
    'nothing new': 'nothing new',
    failed: 'failed',
    cancelled: 'cancelled',
  },
  back: 'All imports',
  fileSentence: (count: number, measure: string) => `${rows(count)} for ${measure}.`,
  mappingHeading: 'What the columns hold',
  mappingSentence: 'One sentence for each column, with the first values of the file.',
  column: (name: string) => `Column ${name}`,
  holds: 'holds',
  valuesLike: (samples: readonly string[]) =>
    samples.length === 0 ? 'no values' : `values like ${samples.join(', ')}`,
  meaningOf: (name: string) => `What column ${name} holds`,
  meanings: {
    none: 'nothing to import',
    subject: 'the subject code',
    value: (measure: string, unit: string | null) => (unit ? `${measure} in ${unit}` : measure),
    date: 'the date of the reading',
    days: 'days since baseline',
    visit: 'the name of a logged visit',
    replicate: 'the replicate number',
    site: 'the site code',
  },
  order: 'Order of its parts',
  orders: {
    'year-month-day': 'year, month, day',
    'day-month-year': 'day, month, year',
    'month-day-year': 'month, day, year',
  },
  orderHint: 'Never guessed: 03/04 could be either day.',
  decimal: 'Decimal mark of the values',
  decimals: { '.': 'a point: 1.5', ',': 'a comma: 1,5' },
  newHeading: 'Subjects that are not enrolled yet',
  newChoice: 'Rows of subjects that are not enrolled',
  newRefuse: 'are refused',
  newEnrol: 'enrol the subject',
  newEnrolNote: 'with site, consent and baseline given here, once for all or from a column',
  newSite: 'Site',
  newConsentVersion: 'Consent version',
  newConsentDate: 'Consent date',
  newBaselineDate: 'Baseline date (day 0)',
  newOrder: 'Order of the parts of dates in columns',
  sameForAll: 'the same for all',
  fromColumn: 'from a column',
  sourceOf: (fact: string) => `${fact} comes`,
  columnOf: (fact: string) => `Column with: ${fact.toLowerCase()}`,
  needs: {
    subject: 'Say which column holds the subject code.',
    value: 'Say which column holds the values.',
    when: 'Say which column tells when: a date, days since baseline, or a visit.',
    once: 'Only one column can hold this.',
    order: 'Choose the order.',
    fact: 'Fill this in, or take it from a column.',
  },
  check: 'Run the dry run',
  checkAgain: 'Run the dry run again',
  checking: 'Dry run: rows read',
  applying: 'Writing: rows read',
  outcomeHeading: 'What the dry run found',
  outcome: {
    fresh: (count: number) =>
      count === 0 ? 'No row is new.' : `${readings(count)} would be written.`,
    known: (count: number) =>
      count === 1
        ? '1 row is known already and changes nothing.'
        : `${rows(count)} are known already and change nothing.`,
    refused: (count: number) =>
      count === 1
        ? '1 row is refused; the reason stands below.'
        : `${rows(count)} are refused; the reasons stand below.`,
    newSubjects: (count: number) => `${counted(count, 'subject', 'subjects')} would be enrolled.`,
    newVisits: (count: number, unscheduled: number) =>
      unscheduled === 0
        ? `${counted(count, 'visit', 'visits')} would be logged.`
        : `${counted(count, 'visit', 'visits')} would be logged, ${formatCount(unscheduled)} of them unscheduled because no window holds the day.`,
    implausible: (count: number) =>
      `${counted(count, 'value lies', 'values lie')} outside the plausible range.`,
  },
  appliedHeading: 'These readings are written',
  appliedSentence: (count: number) => `${readings(count)} came with this file.`,
  nothingNewHeading: 'Nothing new',
  nothingNewSentence: 'Every usable row was known already. The study is as it was.',
  cancelledHeading: 'This import was cancelled',
  cancelledSentence: 'Nothing of it was written. Upload the file again to begin anew.',
  refusedHeading: 'Refused rows',
  refusedSentence: 'Each with its line in the file and the reason.',
  refusedCaption: 'Refused rows of this file',
  refusedNoun: ['refused row', 'refused rows'],
  line: 'Line',
  subject: 'Subject',
  valueColumn: 'Value',
  reason: 'Reason',
  implausibleHeading: 'Values outside the plausible range',
  implausibleSentence: (low: string, high: string) => `Plausible is ${low} to ${high}.`,
  implausibleCaption: 'Values outside the plausible range',
  implausibleNoun: ['value', 'values'],
  visit: 'Visit or date',
  keepChoice: 'These values',
  leaveOut: 'are left out',
  keep: 'are kept, with one explanation for the list',
  chooseKeep: 'Choose whether they are kept or left out.',
  explanation: 'Explanation',
  explanationHint: 'Stands with each of these readings. Never name a participant in it.',
  explanationMissing: 'Say in one sentence why they are kept.',
  apply: (count: number) =>
    count === 0 ? 'Record that nothing is new' : `Write ${readings(count)}`,
  applyHeading: 'Apply this import',
  cancel: 'Cancel this import',
  cancelWhat: 'Nothing is written, and the uploaded file is deleted.',
  cancelled: 'The import is cancelled.',
  toSubjects: 'Read the subjects',
  aboutFile: 'About this file',
  hash: 'SHA-256 of the file',
} as const;

const range = ({ low, high }: ProblemParams) => {
  if (low === '') return `at most ${high}`;
  return high === '' ? `at least ${low}` : `${low} to ${high}`;
};

/** Why a row is refused, by its code. */
export const rowReasons: ProblemSentences = {
  row_ragged:
    'The row has {cells} cells, the header {columns}. Complete it, or remove extra cells.',
  row_formula:
    '{column} holds “{value}”, which a spreadsheet would calculate. Write the value itself.',
  row_subject_missing: '{column} holds no subject code. Write it.',
  row_subject_form:
    '“{value}” is not a subject code: letters, digits, dot, hyphen and underscore, at most 32.',
  row_value_missing:
    '{column} holds no value. A reading that was not taken is logged at its visit.',
  row_value_comma: '“{value}” has “{mark}” as its decimal mark. Choose that mark above.',
  row_value_text: '“{value}” is not a number. Write the number alone, without its unit.',
  row_value_size: '“{value}” is too large to be a reading.',
  row_value_not_positive: '“{value}”: this measure is above zero.',
  row_value_not_count: '“{value}”: this measure counts, so it is a whole number from zero.',
  row_value_yes_no: '“{value}”: write 1 or 0, yes or no.',
  row_value_choice: '“{value}” is not one of {choices}.',
  row_limit_of_choice: '“{value}”: a choice has no limit.',
  row_day_form: '“{value}” is not a whole number of days.',
  row_date_missing: '{column} is empty. Write when the reading was taken.',
  row_date_form: '“{value}” is not a full date in the order {order}.',
  row_date_impossible: '“{value}” is no day of the calendar in the order {order}.',
  row_visit_missing: '{column} is empty. Write the name of the visit.',
  row_replicate_form: '“{value}” is not a replicate number: 1, 2, 3 and so on.',
  row_site_missing: '{column} is empty. Write the site code.',
  row_consent_version: '“{value}” is not a consent version of 1 to 32 letters.',
  row_subject_unknown: 'No subject {subject} at your sites.',
  row_site_unknown: 'No site {site} among your sites.',
  row_site_differs: 'The file says site {given}; the subject belongs to {held}.',
  row_new_subject_differs:
    'Rows of new subject {subject} disagree with line {line} on site, consent or baseline.',
  row_consent_future: 'The consent date {consent} lies in the future.',
  row_baseline_before_consent: 'The baseline date {baseline} lies before consent on {consent}.',
  row_baseline_future: 'The baseline date {baseline} lies in the future.',
  row_not_enrolled: 'The subject is not enrolled (state: {state}).',
  row_no_baseline: 'Subject {subject} has no baseline date, so no day can be placed.',
  row_visit_name: 'The schedule has no visit named “{visit}”.',
  row_visit_not_logged: 'Visit {visit} of this subject is not logged. Use dates instead.',
  row_visit_missed: 'Visit {visit} is recorded as missed; the file dates it {given}.',
  row_visit_date_differs: 'Visit {visit} took place on {held}; the file says {given}.',
  row_date_future: '{date} lies in the future; today is {today}.',
  row_before_consent: '{date} lies before consent on {consent}.',
  row_after_end: '{date} lies after follow-up ended on {ended} ({state}).',
  row_value_differs: 'The study holds {held}; the file says {given}. Nothing is overwritten.',
  row_duplicate: 'Line {line} holds a value for the same subject, visit and replicate.',
  row_impossible: (params) => `${params.value} is impossible: possible is ${range(params)}.`,
  row_implausible_left_out: '{value} is outside the plausible range and was left out.',
};

export const importProblems: ProblemSentences = {
  file_empty: 'The file is empty. Export it again with a header line and at least one row.',
  file_header_only:
    'The file holds a header line and no row below it. Export it again with its rows.',
  file_workbook: 'This is a spreadsheet workbook. Save it as CSV (UTF-8) and upload that.',
  file_utf16: 'The file is written in UTF-16. Save it as CSV (UTF-8).',
  file_nul_byte: 'Line {line}, column {column} holds a NUL byte: this is not a text file.',
  file_not_utf8:
    'Line {line}, column {column} holds a letter that is not UTF-8. Save the file as CSV (UTF-8).',
  file_line_too_long:
    'Line {line} is longer than {kilobytes} kB, so this is not a file of readings. Check the export.',
  file_open_quote:
    'A quote opened in line {line}, column {column} never closes. Close it, or remove it.',
  file_one_column:
    'Line {line} holds a single column. Separate columns by comma, semicolon or tab.',
  file_header_blank: 'Column {column} of the header in line {line} has no name. Give it one.',
  file_header_repeated:
    'The header names “{name}” twice, in columns {first} and {second}. Give each its own name.',
  file_too_many_columns: 'The header has {columns} columns; at most {most} can be read.',
  file_arm_names:
    'Column “{name}” holds arm names of this masked study. Nothing was stored. Remove the column and upload the file again.',
  import_file_missing: 'Choose a file.',
  import_file_named_for_arm:
    'The name of the file holds an arm name of this masked study. Nothing was stored. Rename the file and upload it again.',
  import_file_too_large:
    'The file is larger than {megabytes} MB. Split it and import the parts one after the other.',
  import_measure_unknown: 'This study has no such measure any more. Choose one of the list.',
  import_column_unknown: 'The file has no column “{column}”. Choose one of its columns.',
  import_column_twice: 'Column “{column}” is used for two things. Choose another for one of them.',
  import_when_missing: 'Say which column tells when a reading was taken.',
  import_busy: 'This import is being worked on. Wait until it is done, or cancel it.',
  import_not_checked: 'Run the dry run before applying.',
  import_ended: 'This import has ended ({state}). Upload the file again to begin anew.',
  import_changed:
    'The study changed since the dry run, so its figures no longer hold. Nothing was written; run the dry run again.',
  import_nothing_to_apply:
    'Every row is refused, so there is nothing to apply. Mend the mapping or the file.',
  import_explanation_needed:
    'Say in one sentence why the {count} implausible values are kept, or leave them out.',
  import_failed: 'The import could not be done. Nothing was written; try again.',
  study_not_open: 'The study is {state}; nothing can be entered.',
};
