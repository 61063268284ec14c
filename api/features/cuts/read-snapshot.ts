/** What the database holds of a study's subjects at one moment, subject by subject. */
import type { EntityManager } from 'typeorm';
import type { ReadingOfCut, SubjectOfCut, VisitOfCut } from './cut-shapes.ts';

const SUBJECTS_PER_FETCH = 200;

type VisitCells = [string, string | null, string | null, VisitOfCut['precision']];
type ReadingCells = [
  visitId: string | null,
  measure: string,
  replicate: number,
  value: number | null,
  choice: string | null,
  limitSign: '<' | '>' | null,
  limitValue: number | null,
  notDone: string | null,
  enteredAt: string,
  enteredDay: string,
];

interface SnapshotRow {
  uid: string;
  code: string;
  site: string;
  group: string | null;
  baseline_date: string | null;
  state: SubjectOfCut['state'];
  state_date: string | null;
  visits: VisitCells[] | null;
  readings: ReadingCells[] | null;
}

/**
 * Goes through all subjects of a study in order of their code, a few hundred at a time.
 *
 * Everything comes from one statement, through a cursor: a cursor sees what was committed when it was
 * opened and nothing later, however long the reading takes. That one moment is the entry time of the
 * cut. The transaction around it can therefore stay READ COMMITTED, which the audit chain needs: under
 * REPEATABLE READ its head, moved on by another writer meanwhile, could not be locked (40001).
 *
 * @param manager inside a transaction
 * @param withGroup reads the open arm; only for a study that is not masked
 * @param onSubject called once a subject
 */
export async function forEachSubject(
  manager: EntityManager,
  studyId: string,
  measureIds: readonly string[],
  withGroup: boolean,
  onSubject: (subject: SubjectOfCut) => void,
): Promise<void> {
  // All rows will be fetched: without this the planner prefers what is quick for the first tenth of them.
  await manager.query('SET LOCAL cursor_tuple_fraction = 1');
  await manager.query(
    `DECLARE cut_subjects NO SCROLL CURSOR FOR
     SELECT s.uid, s.code, st.code AS site, ${withGroup ? 'arm.name' : 'NULL::text'} AS "group",
            s.baseline_date::text, s.state, s.state_date::text, v.list AS visits, r.list AS readings
       FROM subject s
       JOIN site st ON st.id = s.site_id
       ${withGroup ? OPEN_ARM : ''}
       LEFT JOIN (
         SELECT visit.subject_id,
                json_agg(json_build_array(visit.id::text, visit.planned_visit_id::text,
                  visit.date::text, visit.date_precision) ORDER BY visit.id) AS list
           FROM visit WHERE visit.study_id = $1 GROUP BY visit.subject_id
       ) v ON v.subject_id = s.id
       LEFT JOIN (
         SELECT reading.subject_id,
                json_agg(json_build_array(reading.visit_id::text, m.short_name, reading.replicate,
                  reading.value, reading.choice, reading.limit_sign, reading.limit_value,
                  reading.not_done,
                  to_char(reading.entered_at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'),
                  (reading.entered_at AT TIME ZONE place.time_zone)::date::text)
                  ORDER BY reading.id) AS list
           FROM reading
           JOIN measure m ON m.id = reading.measure_id
           JOIN subject owner ON owner.id = reading.subject_id
           JOIN site place ON place.id = owner.site_id
          WHERE reading.study_id = $1 AND reading.measure_id = ANY($2::bigint[])
          GROUP BY reading.subject_id
       ) r ON r.subject_id = s.id
      WHERE s.study_id = $1
      ORDER BY s.code COLLATE "C"`,
    [studyId, measureIds],
  );
  for (;;) {
    const rows: SnapshotRow[] = await manager.query(
      `FETCH ${SUBJECTS_PER_FETCH} FROM cut_subjects`,
    );
    for (const row of rows) {
      onSubject(toSubject(row));
    }
    if (rows.length < SUBJECTS_PER_FETCH) {
      break;
    }
  }
  await manager.query('CLOSE cut_subjects');
}

const OPEN_ARM = `LEFT JOIN open_arm oa ON oa.subject_id = s.id AND oa.study_id = s.study_id
       LEFT JOIN arm ON arm.id = oa.arm_id`;

function toSubject(row: SnapshotRow): SubjectOfCut {
  return {
    uid: row.uid,
    code: row.code,
    site: row.site,
    group: row.group,
    baselineDate: row.baseline_date,
    state: row.state,
    stateDate: row.state_date,
    visits: (row.visits ?? []).map(([id, plannedVisitId, date, precision]) => ({
      id,
      plannedVisitId,
      date,
      precision,
    })),
    readings: (row.readings ?? []).map(
      ([visitId, measure, replicate, value, choice, limitSign, limitValue, notDone, at, day]) => {
        const reading: ReadingOfCut = {
          visitId,
          measure,
          replicate,
          value,
          choice,
          limitSign,
          limitValue,
          notDone,
          enteredAt: at,
          enteredDay: day,
        };
        return reading;
      },
    ),
  };
}
