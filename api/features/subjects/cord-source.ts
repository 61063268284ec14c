/** Reads what cords are made of, for many subjects at once. */
import type { EntityManager } from 'typeorm';
import { Measure, PlannedVisit, Study } from '../../../database/entities/index.ts';
import type { LoggedOfSubject, PlannedOfStudy } from './cord.ts';

export interface StudyPlan {
  planned: PlannedOfStudy[];
  closingDays: number;
  measuresAtVisits: number;
}

export async function readStudyPlan(manager: EntityManager, studyId: string): Promise<StudyPlan> {
  const study = await manager.getRepository(Study).findOneByOrFail({ id: studyId });
  const planned = await manager
    .getRepository(PlannedVisit)
    .find({ where: { studyId }, order: { position: 'ASC' } });
  const measuresAtVisits = await manager.getRepository(Measure).countBy({ studyId, per: 'visit' });
  return { planned, closingDays: study.closingDays, measuresAtVisits };
}

interface VisitRow {
  subject_id: string;
  id: string;
  uid: string;
  planned_visit_id: string | null;
  date: string | null;
  date_precision: 'day' | 'month' | 'year';
  missed: boolean;
  taken: number;
  not_applicable: number;
}

/** The logged visits of the subjects, by the inner key of the subject, each list in order of entry. */
export async function readLoggedVisits(
  manager: EntityManager,
  subjectIds: readonly string[],
  measuresAtVisits: number,
): Promise<Map<string, LoggedOfSubject[]>> {
  const rows: VisitRow[] = await manager.query(
    `SELECT v.subject_id, v.id, v.uid, v.planned_visit_id, v.date, v.date_precision,
            v.missed_reason IS NOT NULL AS missed, read.taken, read.not_applicable
       FROM visit v
       LEFT JOIN LATERAL (
         SELECT (count(*) FILTER (WHERE m.taken))::int AS taken,
                (count(*) FILTER (WHERE NOT m.taken AND m.not_applicable))::int AS not_applicable
           FROM (SELECT measure_id, bool_or(not_done IS NULL) AS taken,
                        bool_or(not_done = 'not applicable') AS not_applicable
                   FROM reading WHERE visit_id = v.id GROUP BY measure_id) m
       ) read ON true
      WHERE v.subject_id = ANY($1::bigint[])
      ORDER BY v.id`,
    [subjectIds],
  );
  const bySubject = new Map<string, LoggedOfSubject[]>();
  for (const row of rows) {
    const list = bySubject.get(row.subject_id) ?? [];
    list.push({
      id: row.id,
      uid: row.uid,
      plannedVisitId: row.planned_visit_id,
      date: row.date,
      datePrecision: row.date_precision,
      missed: row.missed,
      measuresDue: measuresAtVisits - row.not_applicable,
      measuresTaken: row.taken,
    });
    bySubject.set(row.subject_id, list);
  }
  return bySubject;
}
