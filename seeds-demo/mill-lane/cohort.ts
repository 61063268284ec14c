/** The invented cohort of the Mill Lane walking groups: one village, two groups that anyone may see. */
import { addDays, daysBetween } from '../days.ts';
import { Draws } from '../draws.ts';

export const MILL_LANE_VISITS = [
  { name: 'Start', day: 0, before: 0, after: 3 },
  { name: 'Week 6', day: 42, before: 7, after: 7 },
  { name: 'Week 12', day: 84, before: 7, after: 7 },
  { name: 'Week 18', day: 126, before: 7, after: 7 },
  { name: 'Week 24', day: 168, before: 7, after: 7 },
] as const;

export type Walker = {
  code: string;
  group: 0 | 1;
  consentDate: string;
  baselineDate: string;
  visits: { planned: string; date: string; distance: number }[];
};

const WALKERS = 36;
const STARTED_DAYS_AGO = 260;

/** @param today the day of seeding, to which all dates count back */
export function millLaneCohort(today: string): Walker[] {
  return Array.from({ length: WALKERS }, (_, index) => {
    const draws = new Draws('mill lane walker', index);
    const baselineDate = addDays(today, -STARTED_DAYS_AGO + index * 2 + draws.between(0, 1));
    const group: 0 | 1 = index % 2 === 0 ? 0 : 1;
    const level = 430 + 62 * draws.normal();
    const slope = (group === 1 ? 1.6 : 0.7) + 0.9 * draws.normal();
    const leaves = draws.chance(0.14) ? draws.between(60, 160) : Number.POSITIVE_INFINITY;
    const visits = MILL_LANE_VISITS.flatMap((planned) => {
      const day =
        planned.day === 0 ? 0 : planned.day + draws.between(-planned.before, planned.after);
      const distance = Math.round(level + (slope * day) / 7 + 19 * draws.normal());
      const away = planned.day > 0 && draws.chance(0.06);
      const date = addDays(baselineDate, day);
      if (away || day >= leaves || daysBetween(date, today) < 1) return [];
      return [{ planned: planned.name, date, distance: Math.max(90, distance) }];
    });
    return {
      code: `ML${String(index + 1).padStart(2, '0')}`,
      group,
      consentDate: addDays(baselineDate, -draws.between(1, 5)),
      baselineDate,
      visits,
    };
  });
}
