import type { PlannedWindow } from './visit-state.ts';

/**
 * The planned visit that a day belongs to: the one whose window holds it. Where windows overlap, the one
 * with the closest target; on a tie the later. Null: no window holds the day, so it is unscheduled.
 *
 * @param day days from baseline
 */
export function placeDay<P extends PlannedWindow>(
  day: number,
  plannedVisits: readonly P[],
): P | null {
  let best: P | null = null;
  for (const planned of plannedVisits) {
    const from = planned.targetDay - planned.windowBefore;
    const to = planned.targetDay + planned.windowAfter;
    if (day < from || day > to) {
      continue;
    }
    const distance = Math.abs(day - planned.targetDay);
    const held = best === null ? Number.POSITIVE_INFINITY : Math.abs(day - best.targetDay);
    const tieAndLater = distance === held && best !== null && planned.targetDay > best.targetDay;
    if (distance < held || tieAndLater) {
      best = planned;
    }
  }
  return best;
}
