/** Which states a subject may pass between, and which end follow-up. */
import type { SubjectState } from '../../contracts/subjects.ts';

const LEAVING: readonly SubjectState[] = [
  'completed',
  'withdrawn from visits',
  'consent withdrawn',
  'lost to follow-up',
  'died',
];

/** Withdrawn never means deleted, and a subject lost may be found again. */
export const STATE_STEPS: Readonly<Record<SubjectState, readonly SubjectState[]>> = {
  screening: ['screen failed', 'enrolled'],
  'screen failed': ['screening'],
  enrolled: ['stopped the intervention but followed', ...LEAVING],
  'stopped the intervention but followed': ['enrolled', ...LEAVING],
  completed: ['enrolled', 'consent withdrawn', 'died'],
  'withdrawn from visits': ['enrolled', 'consent withdrawn', 'died'],
  'consent withdrawn': ['died'],
  'lost to follow-up': ['enrolled', 'withdrawn from visits', 'consent withdrawn', 'died'],
  died: [],
};

const ENDING: ReadonlySet<SubjectState> = new Set([...LEAVING, 'screen failed']);

/** The day follow-up ended; null while it goes on. Who stopped the intervention is still followed. */
export function endOfFollowUp(state: SubjectState, stateDate: string | null): string | null {
  return ENDING.has(state) ? stateDate : null;
}

/** After these, a visit with a later date can't have taken place. */
export const NO_VISIT_AFTER: ReadonlySet<SubjectState> = new Set(['consent withdrawn', 'died']);
