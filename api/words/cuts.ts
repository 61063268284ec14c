/** Refusals about cuts, and their mend. */
import { defineProblems } from './problem-words.ts';

export const cutProblems = defineProblems({
  cut_day_invalid: {
    status: 422,
    title: 'No such day',
    detail: '{day} is not a day of the calendar. Choose the last visit day of the cut.',
  },
  cut_in_future: {
    status: 422,
    title: 'Cutoff in the future',
    detail:
      'The visit cutoff {day} lies in the future; today is {today}. Choose today or an earlier day.',
  },
  cut_measure_unknown: {
    status: 422,
    title: 'Unknown measure',
    detail: 'This study has no measure `{measure}`. Choose measures of the list.',
  },
  cut_needs_visit_measure: {
    status: 422,
    title: 'No measure read at visits',
    detail:
      'All chosen measures are read once per subject, so no visit would have a row. Add a measure that is read at visits.',
  },
  cut_exclusion_unknown: {
    status: 422,
    title: 'Exclusion of something unknown',
    detail:
      'Exclusion {row} names `{value}`, which this cut does not hold. Correct it, or remove the exclusion.',
  },
  cut_nothing_to_freeze: {
    status: 422,
    title: 'Nothing to freeze',
    detail:
      'No reading was due or taken by {day}, so there is nothing to freeze. Choose a later day or other measures.',
  },
});
