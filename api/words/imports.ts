/** Sentences for refused files and rows, and for refused acts on an import. */
import { defineProblems } from './problem-words.ts';

/** A whole file that can't be read; nothing of it is kept. */
export const importFileProblems = defineProblems({
  file_empty: {
    status: 422,
    title: 'Empty file',
    detail: 'The file is empty. Export it again with a header line and at least one row.',
  },
  file_header_only: {
    status: 422,
    title: 'No rows',
    detail: 'The file holds a header line and no row below it. Export it again with its rows.',
  },
  file_workbook: {
    status: 422,
    title: 'Not a CSV file',
    detail:
      'This is a spreadsheet workbook, not a text file. Save it as CSV (UTF-8) and upload that.',
  },
  file_utf16: {
    status: 422,
    title: 'Not UTF-8',
    detail: 'The file is written in UTF-16. Save it as CSV (UTF-8).',
  },
  file_nul_byte: {
    status: 422,
    title: 'Not a text file',
    detail:
      'Line {line}, column {column} holds a NUL byte: this is not a text file. Save it as CSV (UTF-8).',
  },
  file_not_utf8: {
    status: 422,
    title: 'Not UTF-8',
    detail:
      'Line {line}, column {column} holds a letter that is not UTF-8. Save the file as CSV (UTF-8).',
  },
  file_line_too_long: {
    status: 422,
    title: 'Line too long',
    detail:
      'Line {line} is longer than {kilobytes} kB. A row of readings is far shorter: check the export.',
  },
  file_open_quote: {
    status: 422,
    title: 'Open quote',
    detail: 'A quote opened in line {line}, column {column} never closes. Close it, or remove it.',
  },
  file_one_column: {
    status: 422,
    title: 'One column only',
    detail: 'Line {line} holds a single column. Separate the columns by comma, semicolon or tab.',
  },
  file_header_blank: {
    status: 422,
    title: 'Column without a name',
    detail: 'Column {column} of the header in line {line} has no name. Give it one.',
  },
  file_header_repeated: {
    status: 422,
    title: 'Column named twice',
    detail:
      'The header names `{name}` twice, in columns {first} and {second}. Give each column its own name.',
  },
  file_too_many_columns: {
    status: 422,
    title: 'Too many columns',
    detail: 'The header has {columns} columns; at most {most} can be read.',
  },
  file_arm_names: {
    status: 422,
    title: 'Arm names refused',
    detail:
      'Column `{name}` holds arm names of this masked study. Nothing was stored. Remove the column and upload the file again.',
  },
});

export type FileProblemCode = keyof typeof importFileProblems;

/** Refusals of acts on an import. */
export const importProblems = defineProblems({
  ...importFileProblems,
  import_file_missing: {
    status: 422,
    title: 'No file',
    detail: 'The upload holds no file. Choose a CSV file and send it as `file`.',
  },
  import_file_named_for_arm: {
    status: 422,
    title: 'Named for an arm',
    detail:
      'The name of the file holds an arm name of this masked study. Nothing was stored. Rename the file and upload it again.',
  },
  import_file_too_large: {
    status: 413,
    title: 'File too large',
    detail:
      'The file is larger than {megabytes} MB. Split it and import the parts one after the other.',
  },
  import_measure_unknown: {
    status: 422,
    title: 'Unknown measure',
    detail: 'This study has no such measure. Choose one of the list.',
  },
  import_column_unknown: {
    status: 422,
    title: 'Unknown column',
    detail: 'The file has no column `{column}`. Choose one of its columns.',
  },
  import_column_twice: {
    status: 422,
    title: 'Column used twice',
    detail: 'Column `{column}` is used for two things. Choose another for one of them.',
  },
  import_when_missing: {
    status: 422,
    title: 'When is missing',
    detail:
      'Say which column tells when a reading was taken: a date, days since baseline, or a visit.',
  },
  import_busy: {
    status: 409,
    title: 'Being worked on',
    detail: 'This import is being worked on. Wait until it is done, or cancel it.',
  },
  import_not_checked: {
    status: 409,
    title: 'Dry run first',
    detail: 'This import is {state}. Run the dry run before applying it.',
  },
  import_ended: {
    status: 409,
    title: 'Import has ended',
    detail: 'This import is {state}. Upload the file again to begin anew.',
  },
  import_changed: {
    status: 409,
    title: 'The study changed since the dry run',
    detail:
      'The study changed since the dry run, so its figures no longer hold. Nothing was written; run the dry run again.',
  },
  import_nothing_to_apply: {
    status: 409,
    title: 'Nothing to apply',
    detail: 'Every row is refused, so there is nothing to apply. Mend the mapping or the file.',
  },
  import_explanation_needed: {
    status: 422,
    title: 'Explanation needed',
    detail: 'Say in one sentence why the {count} implausible values are kept, or leave them out.',
  },
  import_failed: {
    status: 500,
    title: 'The import failed',
    detail: 'The import could not be done. Nothing was written; try again.',
  },
  study_not_open: {
    status: 409,
    title: 'Study not open',
    detail: 'The study is {state}; nothing can be entered.',
  },
});

export const rowRefusalWords = {
  row_ragged:
    'The row has {cells} cells and the header has {columns}. Complete the row or remove the extra cells.',
  row_formula:
    'Column `{column}` holds `{value}`, which a spreadsheet would calculate. Write the value itself.',
  row_subject_missing: 'Column `{column}` holds no subject code. Write it.',
  row_subject_form:
    '`{value}` in column `{column}` is not a subject code: letters, digits, dot, hyphen and underscore, at most 32, beginning with a letter or digit.',
  row_value_missing:
    'Column `{column}` holds no value. Log a reading that was not taken at its visit.',
  row_value_comma:
    '`{value}` in column `{column}` uses `{mark}` as its decimal mark. Choose that mark, or write the other.',
  row_value_text:
    '`{value}` in column `{column}` is not a number. Write the number alone, without unit.',
  row_value_size: '`{value}` in column `{column}` is too large to be a reading.',
  row_value_not_positive: '`{value}` in column `{column}`: this measure is above zero.',
  row_value_not_count:
    '`{value}` in column `{column}`: this measure counts, so it is a whole number from zero.',
  row_value_yes_no: '`{value}` in column `{column}`: write 1 or 0, yes or no.',
  row_value_choice: '`{value}` in column `{column}` is not one of {choices}.',
  row_limit_of_choice: '`{value}` in column `{column}`: a choice has no limit.',
  row_day_form: '`{value}` in column `{column}` is not a whole number of days.',
  row_date_missing: 'Column `{column}` is empty. Write when the reading was taken.',
  row_date_form: '`{value}` in column `{column}` is not a full date in the order {order}.',
  row_date_impossible:
    '`{value}` in column `{column}` is no date of the calendar in the order {order}.',
  row_visit_missing: 'Column `{column}` is empty. Write the name of the visit.',
  row_replicate_form:
    '`{value}` in column `{column}` is not a replicate number: 1, 2, 3 and so on.',
  row_site_missing: 'Column `{column}` is empty. Write the site code.',
  row_consent_version:
    '`{value}` in column `{column}` is not a consent version of 1 to 32 letters.',
  row_subject_unknown: 'No subject {subject} at your sites.',
  row_site_unknown: 'No site {site} among your sites.',
  row_site_differs: 'The file says site {given}; the subject belongs to {held}.',
  row_new_subject_differs:
    'Rows of new subject {subject} disagree on site, consent or baseline with line {line}. Make them agree.',
  row_consent_future: 'The consent date {consent} lies in the future.',
  row_baseline_before_consent: 'The baseline date {baseline} lies before consent on {consent}.',
  row_baseline_future: 'The baseline date {baseline} lies in the future.',
  row_not_enrolled: 'The subject is not enrolled (state: {state}).',
  row_no_baseline: 'Subject {subject} has no baseline date, so no day can be placed.',
  row_visit_name: 'The schedule has no visit named `{visit}`.',
  row_visit_not_logged: 'Visit {visit} of this subject is not logged. Log it first, or use dates.',
  row_visit_missed: 'Visit {visit} is recorded as missed; the file dates it {given}.',
  row_visit_date_differs: 'Visit {visit} took place on {held}; the file says {given}.',
  row_date_future: '{date} lies in the future; today is {today}.',
  row_before_consent: '{date} lies before consent on {consent}.',
  row_after_end: '{date} lies after the subject’s follow-up ended on {ended} ({state}).',
  row_value_differs:
    'The study holds {held}; the file says {given}. Correct the reading with a reason instead.',
  row_duplicate: 'Line {line} holds a value for the same subject, visit and replicate.',
  row_impossible: '{value} is impossible for this measure (from {low} to {high}).',
  row_implausible_left_out: '{value} is outside the plausible range and was left out.',
} as const;

export type RowRefusalCode = keyof typeof rowRefusalWords;
