/** Words of the page that runs a fit. */
import { inSentence } from './analysis.ts';

export const fitWords = {
  heading: 'Say what this fit is for before you see it',
  sentence: (fit: string, measure: string) => `${fit} of ${inSentence(measure)}.`,
  forbidden: 'Analysts of the study run fits. Ask its owner for that role.',
  what: 'What will be fitted',
  fit: 'Fit',
  cut: 'Cut',
  visitsTo: (day: string) => `visits to ${day}`,
  measure: 'Measure',
  time: 'Time',
  group: 'Groups',
  compared: (groups: readonly string[]) => `compared: ${groups.join(', ')}`,
  together: 'all subjects together',
  purpose: 'This fit is',
  planned: 'Planned',
  plannedNote:
    'Written down before anyone saw these readings: in the protocol or the analysis plan.',
  exploratory: 'Exploratory',
  exploratoryNote:
    'Thought of after looking, or to see what there is. Its p values don’t confirm anything.',
  choose: 'Choose one: the record keeps it.',
  run: 'Run this fit',
  running: 'Fitting. The record is written when it is done.',
  kept: 'Every run leaves a record that can’t be removed.',
  backToCheck: 'Open the check',
  backToCheckFrom: 'Back to the check',
  nothingHeading: 'Choose what to fit in the check',
  nothingSentence:
    'A fit begins in the independence check: choose a cut, a measure and a time axis there.',
  stampSays: 'Everything that comes from this fit will carry the stamp.',
} as const;
