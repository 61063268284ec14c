/**
 * Where in follow-up each row belongs, and whether its content was applied before.
 *
 * The place that enters the content hash is found from the schedule alone, before any logged visit is
 * looked at. So a row stays the same row when its visit was moved or its reading corrected since.
 */
import type { Judging, Query } from './judging.ts';

export async function placeRows(query: Query, judging: Judging): Promise<void> {
  if (judging.per === 'subject') {
    await query(`UPDATE staged_row SET place = 'subject' WHERE reason IS NULL`);
  } else if (judging.when === 'visit') {
    await placeByName(query, judging.studyId);
  } else {
    await placeByDay(query, judging.studyId);
  }
}

async function placeByName(query: Query, studyId: string): Promise<void> {
  await query(
    `UPDATE staged_row s SET planned_visit_id = p.id, place = 'planned:' || p.uid
       FROM planned_visit p
      WHERE s.reason IS NULL AND p.study_id = $1 AND p.name = s.visit_given`,
    [studyId],
  );
  await query(
    `UPDATE staged_row SET reason = 'row_visit_name', params = jsonb_build_object('visit', visit_given)
      WHERE reason IS NULL AND place IS NULL`,
  );
}

/** A day belongs to the planned visit whose window holds it: the closest target, on a tie the later. */
async function placeByDay(query: Query, studyId: string): Promise<void> {
  await query(
    `UPDATE staged_row
        SET reason = 'row_no_baseline', params = jsonb_build_object('subject', subject_code)
      WHERE reason IS NULL AND baseline_date IS NULL`,
  );
  await query(
    `UPDATE staged_row SET on_date = coalesce(date_given, baseline_date + day_given)
      WHERE reason IS NULL`,
  );
  await query(
    `UPDATE staged_row s SET planned_visit_id = held.id, place = 'planned:' || held.uid
       FROM (SELECT DISTINCT ON (days.day) days.day, p.id, p.uid
               FROM (SELECT DISTINCT on_date - baseline_date AS day
                       FROM staged_row WHERE reason IS NULL) days
               JOIN planned_visit p
                 ON p.study_id = $1
                AND days.day BETWEEN p.target_day - p.window_before AND p.target_day + p.window_after
              ORDER BY days.day, abs(days.day - p.target_day), p.target_day DESC) held
      WHERE s.reason IS NULL AND s.on_date - s.baseline_date = held.day`,
    [studyId],
  );
  await query(
    `UPDATE staged_row SET place = 'day:' || on_date WHERE reason IS NULL AND place IS NULL`,
  );
}

export async function markKnown(query: Query, judging: Judging): Promise<void> {
  await query(
    `UPDATE staged_row
        SET content_hash = sha256(convert_to(concat_ws(chr(31), $1::text, subject_code, place, $2::text,
              replicate::text, coalesce(value::text, choice, limit_sign || limit_value::text)), 'UTF8'))
      WHERE reason IS NULL`,
    [judging.studyUid, judging.measureUid],
  );
  await query(
    `UPDATE staged_row s SET known = true
       FROM applied_row a
      WHERE s.reason IS NULL AND a.study_id = $1 AND a.content_hash = s.content_hash`,
    [judging.studyId],
  );
}

/** Finds the logged visit of each new row, or refuses the row with both dates. */
export async function judgeVisits(query: Query, judging: Judging): Promise<void> {
  await query(
    `UPDATE staged_row s
        SET reason = 'row_not_enrolled', params = jsonb_build_object('state', x.state)
       FROM subject x
      WHERE s.reason IS NULL AND NOT s.known AND x.id = s.subject_id
        AND x.state IN ('screening', 'screen failed')`,
  );
  if (judging.per === 'subject') return;
  if (judging.when === 'visit') await findNamedVisit(query);
  else await findVisitOfDay(query, judging);
  await query(
    `UPDATE staged_row s
        SET reason = 'row_after_end',
            params = jsonb_build_object('state', x.state, 'ended', x.state_date, 'date', s.on_date)
       FROM subject x
      WHERE s.reason IS NULL AND NOT s.known AND x.id = s.subject_id
        AND x.state IN ('died', 'consent withdrawn') AND s.on_date > x.state_date`,
  );
}

async function findNamedVisit(query: Query): Promise<void> {
  await query(
    `UPDATE staged_row s SET visit_id = v.id, on_date = v.date
       FROM visit v
      WHERE s.reason IS NULL AND NOT s.known
        AND v.subject_id = s.subject_id AND v.planned_visit_id = s.planned_visit_id
        AND v.missed_reason IS NULL AND v.date IS NOT NULL`,
  );
  await query(
    `UPDATE staged_row
        SET reason = 'row_visit_not_logged', params = jsonb_build_object('visit', visit_given)
      WHERE reason IS NULL AND NOT known AND visit_id IS NULL`,
  );
}

async function findVisitOfDay(query: Query, judging: Judging): Promise<void> {
  await query(
    `UPDATE staged_row s
        SET reason = 'row_date_future', params = jsonb_build_object('date', s.on_date, 'today', t.today)
       FROM (SELECT id, ($1::timestamptz AT TIME ZONE time_zone)::date AS today FROM site) t
      WHERE s.reason IS NULL AND NOT s.known AND t.id = s.site_id AND s.on_date > t.today`,
    [judging.now],
  );
  await query(
    `UPDATE staged_row
        SET reason = 'row_before_consent',
            params = jsonb_build_object('date', on_date, 'consent', consent_date)
      WHERE reason IS NULL AND NOT known AND on_date < consent_date`,
  );
  // A visit logged on that very day is the visit, whatever its label; a planned one before an unscheduled.
  await query(
    `UPDATE staged_row s SET visit_id = v.id
       FROM (SELECT DISTINCT ON (subject_id, date) id, subject_id, date
               FROM visit
              WHERE study_id = $1 AND date_precision = 'day' AND missed_reason IS NULL
              ORDER BY subject_id, date, (planned_visit_id IS NULL), id) v
      WHERE s.reason IS NULL AND NOT s.known AND v.subject_id = s.subject_id AND v.date = s.on_date`,
    [judging.studyId],
  );
  await query(
    `UPDATE staged_row s
        SET reason = CASE WHEN v.missed_reason IS NULL THEN 'row_visit_date_differs' ELSE 'row_visit_missed' END,
            params = jsonb_build_object('visit', p.name, 'held', coalesce(v.date::text, ''), 'given', s.on_date)
       FROM visit v JOIN planned_visit p ON p.id = v.planned_visit_id
      WHERE s.reason IS NULL AND NOT s.known AND s.visit_id IS NULL
        AND v.subject_id = s.subject_id AND v.planned_visit_id = s.planned_visit_id`,
  );
  // Two days of one subject in one window: the closest to the target is the visit, on a tie the later.
  await query(
    `UPDATE staged_row s
        SET reason = 'row_visit_date_differs',
            params = jsonb_build_object('visit', w.name, 'held', w.on_date, 'given', s.on_date)
       FROM (SELECT DISTINCT ON (r.subject_code, r.planned_visit_id)
                    r.subject_code, r.planned_visit_id, r.on_date, p.name
               FROM staged_row r JOIN planned_visit p ON p.id = r.planned_visit_id
              WHERE r.reason IS NULL AND NOT r.known AND r.visit_id IS NULL
              ORDER BY r.subject_code, r.planned_visit_id,
                       abs(r.on_date - r.baseline_date - p.target_day), r.on_date DESC) w
      WHERE s.reason IS NULL AND NOT s.known AND s.visit_id IS NULL
        AND s.subject_code = w.subject_code AND s.planned_visit_id = w.planned_visit_id
        AND s.on_date <> w.on_date`,
  );
}
