/** Refusals when subjects, visits and readings are entered: by hand, or row by row of a file. */
import type { ProblemSentences } from './problems.ts';

export const entryProblems: ProblemSentences = {
  subject_unknown: 'No subject {subject} that you may see. Check the code.',
  subject_code_form:
    '{subject} is not a subject code. Use 1 to 32 letters, digits, dots, underscores and hyphens, a letter or digit first.',
  subject_code_taken:
    'The study has a subject {subject} already. Check the code, or choose another.',
  subject_site_unknown: 'No site {site} that you work for. Choose one of your sites.',
  subject_consent_missing:
    'A subject is enrolled with the version and the date of the consent. Give both.',
  subject_date_future: 'The {what} {date} lies in the future; today is {today}. Correct the date.',
  subject_before_consent:
    'The {what} {date} lies before the consent of {consent}. Correct one of the two.',
  subject_state_step: 'A subject who is “{from}” can’t become “{to}”. Possible: {possible}.',
  subject_reason_missing: 'Say in a few words why the subject becomes “{to}”.',
  subject_not_enrolled:
    'Subject {subject} is “{state}”. Visits are logged for enrolled subjects only.',
  subject_ended: 'Subject {subject} is “{state}” since {ended}. A visit on {date} can’t be logged.',
  visit_plan_unknown: 'The schedule has no visit “{visit}”. Choose one of the schedule.',
  visit_logged_already:
    'Visit “{visit}” of subject {subject} is logged already ({held}). Correct that one.',
  visit_reason_missing: 'An unscheduled visit carries a reason. Give it in a few words.',
  visit_missed_reason: 'Choose why the visit was missed; “other” needs a few words of its own.',
  visit_not_due: 'The window of visit “{visit}” opens on {opens}, so it can’t be missed yet.',
  reading_measure_unknown: 'The study has no measure `{measure}`. Choose one of its measures.',
  reading_twice:
    '{measure}, replicate {replicate}, stands twice. Give each replicate its own number.',
  reading_held:
    '{measure}, replicate {replicate}, is held already. Correct that reading with a reason.',
  reading_one_content:
    '{measure} takes one of: a value, a choice, a limit, or why it was not done.',
  reading_not_finite: '{measure} takes a finite number.',
  reading_not_positive: '{measure} is above zero; {given} is not. Read it again.',
  reading_not_count: '{measure} is a whole number from 0; {given} is not. Read it again.',
  reading_not_yes_no: '{measure} is 1 for yes or 0 for no; {given} is neither.',
  reading_needs_number: '{measure} has no limit of quantification. Give yes or no.',
  reading_choice_unknown: '{measure} does not take {given}. Use one of its choices.',
  reading_impossible: '{measure} can’t be {given}: possible is {low} to {high}. Read it again.',
  reading_implausible:
    '{measure} is {given}; expected is {low} to {high}. Read it again, and explain it if it stands.',
  reading_not_done_reason:
    '“{given}” is no category for a reading that was not done. Choose one of the list.',
  reading_unchanged: 'The new content is the content held. Nothing was changed.',
  correction_reason: 'Choose why the reading is corrected; “other” needs a few words of its own.',
};
