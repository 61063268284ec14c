/** Refusals around subjects, visits, readings, set-up and allocation. */
import { defineProblems } from './problem-words.ts';

export const subjectProblems = defineProblems({
  study_not_open: {
    status: 409,
    title: 'Study not open',
    detail: 'The study is {state}: nothing more is entered or corrected in it.',
  },
  subject_unknown: {
    status: 404,
    title: 'No such subject',
    detail: 'No subject {subject} that you may see. Check the code.',
  },
  subject_code_form: {
    status: 422,
    title: 'Not a subject code',
    detail:
      '{subject} is not a subject code. Use 1 to 32 letters, digits, dots, underscores and hyphens, a letter or digit first.',
  },
  subject_code_taken: {
    status: 409,
    title: 'Code in use',
    detail: 'The study has a subject {subject} already. Check the code, or choose another.',
  },
  subject_site_unknown: {
    status: 422,
    title: 'No such site',
    detail: 'No site {site} that you work for. Choose one of your sites.',
  },
  subject_consent_missing: {
    status: 422,
    title: 'Consent missing',
    detail: 'A subject is enrolled with the version and the date of the consent. Give both.',
  },
  subject_date_future: {
    status: 422,
    title: 'Date in the future',
    detail: 'The {what} {date} lies in the future; today is {today}. Correct the date.',
  },
  subject_before_consent: {
    status: 422,
    title: 'Before consent',
    detail: 'The {what} {date} lies before the consent of {consent}. Correct one of the two.',
  },
  subject_state_step: {
    status: 409,
    title: 'Not possible from here',
    detail: 'A subject who is “{from}” can’t become “{to}”. Possible: {possible}.',
  },
  subject_reason_missing: {
    status: 422,
    title: 'Reason missing',
    detail: 'Say in a few words why the subject becomes “{to}”.',
  },
  subject_not_enrolled: {
    status: 409,
    title: 'Not enrolled',
    detail: 'Subject {subject} is “{state}”. Visits are logged for enrolled subjects only.',
  },
  subject_ended: {
    status: 409,
    title: 'After the end of follow-up',
    detail: 'Subject {subject} is “{state}” since {ended}. A visit on {date} can’t be logged.',
  },
  visit_plan_unknown: {
    status: 422,
    title: 'No such visit',
    detail: 'The schedule has no visit “{visit}”. Choose one of the schedule.',
  },
  visit_logged_already: {
    status: 409,
    title: 'Logged already',
    detail: 'Visit “{visit}” of subject {subject} is logged already ({held}). Correct that one.',
  },
  visit_reason_missing: {
    status: 422,
    title: 'Reason missing',
    detail: 'An unscheduled visit carries a reason. Give it in a few words.',
  },
  visit_missed_reason: {
    status: 422,
    title: 'Reason missing',
    detail: 'Choose why the visit was missed; “other” needs a few words of its own.',
  },
  visit_not_due: {
    status: 409,
    title: 'Not due yet',
    detail: 'The window of visit “{visit}” opens on {opens}, so it can’t be missed yet.',
  },
  reading_measure_unknown: {
    status: 422,
    title: 'No such measure',
    detail: 'The study has no measure `{measure}`. Choose one of its measures.',
  },
  reading_twice: {
    status: 422,
    title: 'Read twice',
    detail: '{measure}, replicate {replicate}, stands twice. Give each replicate its own number.',
  },
  reading_held: {
    status: 409,
    title: 'Read already',
    detail:
      '{measure}, replicate {replicate}, is held already. Correct that reading with a reason.',
  },
  reading_one_content: {
    status: 422,
    title: 'One content only',
    detail: '{measure} takes one of: a value, a choice, a limit, or why it was not done.',
  },
  reading_not_finite: {
    status: 422,
    title: 'Not a number',
    detail: '{measure} takes a finite number.',
  },
  reading_not_positive: {
    status: 422,
    title: 'Not above zero',
    detail: '{measure} is above zero; {given} is not. Read it again.',
  },
  reading_not_count: {
    status: 422,
    title: 'Not a count',
    detail: '{measure} is a whole number from 0; {given} is not. Read it again.',
  },
  reading_not_yes_no: {
    status: 422,
    title: 'Not yes or no',
    detail: '{measure} is 1 for yes or 0 for no; {given} is neither.',
  },
  reading_needs_number: {
    status: 422,
    title: 'No limit here',
    detail: '{measure} has no limit of quantification. Give yes or no.',
  },
  reading_choice_unknown: {
    status: 422,
    title: 'No such choice',
    detail: '{measure} does not take {given}. Use one of its choices.',
  },
  reading_impossible: {
    status: 422,
    title: 'Impossible value',
    detail: '{measure} can’t be {given}: possible is {low} to {high}. Read it again.',
  },
  reading_implausible: {
    status: 422,
    title: 'Read it again',
    detail:
      '{measure} is {given}; expected is {low} to {high}. Read it again, and explain it if it stands.',
  },
  reading_not_done_reason: {
    status: 422,
    title: 'No such category',
    detail: '“{given}” is no category for a reading that was not done. Choose one of the list.',
  },
  reading_unchanged: {
    status: 422,
    title: 'Nothing to correct',
    detail: 'The new content is the content held. Nothing was changed.',
  },
  correction_reason: {
    status: 422,
    title: 'Reason missing',
    detail: 'Choose why the reading is corrected; “other” needs a few words of its own.',
  },
  setup_study_exists: {
    status: 409,
    title: 'Study exists',
    detail: 'A study with the short name “{shortName}” exists already. Choose another short name.',
  },
  setup_file_invalid: {
    status: 422,
    title: 'Set-up file not usable',
    detail: 'The set-up file can’t be used as it stands. Nothing was made.',
  },
  first_owner_same: {
    status: 422,
    title: 'Two persons needed',
    detail:
      'The administrator and the owner have the same address. An administrator never sees study data: give two accounts.',
  },
  allocation_not_here: {
    status: 403,
    title: 'Not open here',
    detail: 'The allocation is entered by the unblinded statistician only.',
  },
  allocation_row_unknown: {
    status: 422,
    title: 'Row not usable',
    detail: 'Row {row} of the list names a subject or an arm that the study does not have.',
  },
  allocation_twice: {
    status: 409,
    title: 'Listed twice',
    detail: 'Row {row} of the list names a subject that is listed already.',
  },
});
