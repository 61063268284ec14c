/** What of the study's set-up a cut depends on. */
import type { EntityManager } from 'typeorm';
import type { CutMeasure } from './cut-repository.ts';
import type { PlannedVisitOfCut } from './cut-shapes.ts';
import { dayInZone } from './days.ts';

export interface StudyPlan {
  masked: boolean;
  lateDays: number;
  /** In the order of the set-up. */
  measures: (CutMeasure & { id: string })[];
  plannedVisits: PlannedVisitOfCut[];
  /** The latest calendar day that has begun at any of the sites. */
  today: string;
  /** Whether groups are open to those who read the cuts of this study. */
  groupsOpen: boolean;
}

export async function readStudyPlan(
  manager: EntityManager,
  studyId: string,
  now: Date,
): Promise<StudyPlan> {
  const [study]: { masked: boolean; late_days: number }[] = await manager.query(
    'SELECT masked, late_days FROM study WHERE id = $1',
    [studyId],
  );
  if (study === undefined) {
    throw new Error('the study was there when the request was let in');
  }
  const measures: StudyPlan['measures'] = await manager.query(
    `SELECT id::text, short_name AS "shortName", label, unit, nature, per, decimals
       FROM measure WHERE study_id = $1 ORDER BY position, id`,
    [studyId],
  );
  const plannedVisits: PlannedVisitOfCut[] = await manager.query(
    `SELECT id::text, name, target_day AS "targetDay", window_after AS "windowAfter"
       FROM planned_visit WHERE study_id = $1 ORDER BY target_day, position, id`,
    [studyId],
  );
  const zones: { time_zone: string }[] = await manager.query(
    'SELECT DISTINCT time_zone FROM site WHERE study_id = $1',
    [studyId],
  );
  const days = zones.map((zone) => dayInZone(now, zone.time_zone));
  const [arms]: { any: boolean }[] = study.masked
    ? [{ any: false }]
    : await manager.query('SELECT EXISTS (SELECT 1 FROM arm WHERE study_id = $1) AS any', [
        studyId,
      ]);
  return {
    masked: study.masked,
    lateDays: study.late_days,
    measures,
    plannedVisits,
    today: days.sort().at(-1) ?? dayInZone(now, 'UTC'),
    groupsOpen: !study.masked && (arms?.any ?? false),
  };
}
