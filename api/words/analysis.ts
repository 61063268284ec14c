/** Refusals about the check, fits and records. */
import { defineProblems } from './problem-words.ts';

export const analysisProblems = defineProblems({
  analysis_measure_unknown: {
    status: 422,
    title: 'Unknown measure',
    detail:
      'This cut holds no measure `{measure}`. Choose one of the cut, or freeze a cut that holds it.',
  },
  analysis_measure_yes_no: {
    status: 422,
    title: 'No straight line for yes or no',
    detail:
      '`{measure}` is answered by yes or no, and a straight line leaves 0 and 1 behind. Choose a continuous, positive or count measure.',
  },
  analysis_measure_choice: {
    status: 422,
    title: 'No straight line for a choice',
    detail:
      '`{measure}` is a choice among words, and a straight line needs numbers. Choose a continuous, positive or count measure.',
  },
  analysis_measure_once: {
    status: 422,
    title: 'Read once per subject',
    detail:
      '`{measure}` is read once per subject, so it has no course over time. Choose a measure that is read at visits.',
  },
  analysis_group_masked: {
    status: 422,
    title: 'Groups are not open',
    detail: 'This study is masked, so its readings are analysed together. Leave the group out.',
  },
  analysis_group_none: {
    status: 422,
    title: 'No groups',
    detail: 'The subjects of this cut belong to no groups. Leave the group out.',
  },
  engine_no_usable_rows: {
    status: 422,
    title: 'No complete reading',
    detail:
      'None of the {rows} rows of the cut has a value and a place on the time axis. Choose another measure or axis, or a later cut.',
  },
  engine_too_few_subjects: {
    status: 422,
    title: 'One subject only',
    detail:
      'All readings are of subject {subject}. The check needs two subjects or more: choose a later cut.',
  },
  engine_too_few_times: {
    status: 422,
    title: 'One time only',
    detail:
      'All readings are at time {time}. A line needs two different times: choose a later cut or the other axis.',
  },
  engine_too_few_readings: {
    status: 422,
    title: 'Too few readings',
    detail:
      '{readings} readings can’t carry {parameters} coefficients. Choose a later cut, or leave the group out.',
  },
  engine_out_of_scale: {
    status: 422,
    title: 'A value out of scale',
    detail:
      'Line {line} of the cut holds {value}, too far from other readings to compute with. Correct the reading and freeze a new cut, or exclude it with a reason.',
  },
  engine_two_levels: {
    status: 422,
    title: 'A subject in two groups',
    detail:
      'Subject {subject} stands in two groups, in line {line} of the cut. Leave the group out.',
  },
  engine_one_level: {
    status: 422,
    title: 'One group only',
    detail: 'All readings belong to one group, so there is none to compare. Leave the group out.',
  },
  engine_collinear: {
    status: 422,
    title: 'A coefficient can’t be told apart',
    detail:
      'The readings don’t tell {column} apart from the other coefficients, for example because a group was read at one time only. Leave the group out, or choose a later cut.',
  },
  check_not_opened: {
    status: 409,
    title: 'The check comes first',
    detail:
      'You have not opened the independence check of this specification. Open it first; then run the fit.',
  },
  ordinary_fit_locked: {
    status: 409,
    title: 'The ordinary fit is locked',
    detail:
      'An ordinary straight line takes these readings as independent, but subjects repeat. Record why it is wanted, in 20 characters or more, for this cut and specification.',
  },
  record_content_differs: {
    status: 409,
    title: 'Another content',
    detail:
      'The record does not hold the content that was to be signed. Open it again and read it before you sign.',
  },
  record_signed_already: {
    status: 409,
    title: 'Signed before',
    detail: 'You signed this record with this meaning before.',
  },
  record_not_run_by_you: {
    status: 422,
    title: 'Run by somebody else',
    detail: 'This analysis was run by {name}. Sign it as reviewed, or leave it to them.',
  },
});
