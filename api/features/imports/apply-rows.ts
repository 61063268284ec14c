/** Writes the judged rows: subjects, visits, readings, and the content of each row, set by set. */
import type { Judging, Query } from './judge/judging.ts';

export type Applying = {
  importId: string;
  accountId: string;
  keepImplausible: boolean;
  explanation: string | null;
};

export type Applied = { readings: number; subjects: number; visits: number; hash: string };

export async function applyRows(
  query: Query,
  judging: Judging,
  applying: Applying,
): Promise<Applied> {
  if (!applying.keepImplausible) {
    await query(
      `UPDATE staged_row
          SET reason = 'row_implausible_left_out', params = jsonb_build_object('value', value_text)
        WHERE reason IS NULL AND NOT known AND implausible`,
    );
  }
  const subjects = await enrolNew(query, judging, applying);
  const visits = judging.per === 'visit' ? await logVisits(query, judging, applying) : 0;
  const readings = await writeReadings(query, judging, applying);
  const [row] = (await query(
    `SELECT encode(sha256(coalesce(string_agg(content_hash, ''::bytea ORDER BY content_hash), ''::bytea)), 'hex') AS hash
       FROM staged_row WHERE reason IS NULL AND NOT known`,
  )) as { hash: string }[];
  return { readings, subjects, visits, hash: row?.hash ?? '' };
}

async function countOf(query: Query, sql: string, params: unknown[]): Promise<number> {
  const [row] = (await query(
    `WITH written AS (${sql} RETURNING 1) SELECT count(*)::int AS n FROM written`,
    params,
  )) as {
    n: number;
  }[];
  return row?.n ?? 0;
}

async function enrolNew(query: Query, judging: Judging, applying: Applying): Promise<number> {
  const written = await countOf(
    query,
    `INSERT INTO subject (study_id, site_id, code, consent_version, consent_date, enrolment_date,
                          baseline_date, state, state_date, created_at, created_by)
     SELECT $1, site_id, subject_code, new_consent_version, new_consent_date, new_consent_date,
            new_baseline_date, 'enrolled', new_consent_date, $2, $3
       FROM (SELECT DISTINCT ON (subject_code) * FROM staged_row
              WHERE reason IS NULL AND NOT known AND is_new ORDER BY subject_code, line) first
      ORDER BY line`,
    [judging.studyId, judging.now, applying.accountId],
  );
  await query(
    `UPDATE staged_row s SET subject_id = x.id
       FROM subject x
      WHERE s.reason IS NULL AND NOT s.known AND s.is_new AND x.study_id = $1 AND x.code = s.subject_code`,
    [judging.studyId],
  );
  return written;
}

async function logVisits(query: Query, judging: Judging, applying: Applying): Promise<number> {
  const written = await countOf(
    query,
    `INSERT INTO visit (study_id, subject_id, planned_visit_id, unscheduled_reason, date, date_precision,
                        import_id, created_at, created_by)
     SELECT $1, subject_id, planned_visit_id,
            CASE WHEN planned_visit_id IS NULL THEN 'from import' END, on_date, 'day', $2, $3, $4
       FROM (SELECT DISTINCT ON (subject_id, place) * FROM staged_row
              WHERE reason IS NULL AND NOT known AND visit_id IS NULL ORDER BY subject_id, place, line) first
      ORDER BY line`,
    [judging.studyId, applying.importId, judging.now, applying.accountId],
  );
  await query(
    `UPDATE staged_row s SET visit_id = v.id
       FROM visit v
      WHERE s.reason IS NULL AND NOT s.known AND s.visit_id IS NULL AND v.import_id = $1
        AND v.subject_id = s.subject_id
        AND (v.planned_visit_id = s.planned_visit_id
             OR (v.planned_visit_id IS NULL AND s.planned_visit_id IS NULL AND v.date = s.on_date))`,
    [applying.importId],
  );
  return written;
}

async function writeReadings(query: Query, judging: Judging, applying: Applying): Promise<number> {
  const written = await countOf(
    query,
    `INSERT INTO reading (study_id, subject_id, visit_id, measure_id, replicate, value, choice, limit_sign,
                          limit_value, explanation, import_id, entered_at, entered_by)
     SELECT $1, subject_id, visit_id, $2, replicate, value, choice, limit_sign, limit_value,
            CASE WHEN implausible THEN $3::text END, $4, $5, $6
       FROM staged_row WHERE reason IS NULL AND NOT known ORDER BY line`,
    [
      judging.studyId,
      judging.measureId,
      applying.explanation,
      applying.importId,
      judging.now,
      applying.accountId,
    ],
  );
  await query(
    `INSERT INTO applied_row (study_id, content_hash, import_id, reading_id)
     SELECT $1, s.content_hash, $2, r.id
       FROM staged_row s
       JOIN reading r ON r.import_id = $2 AND r.subject_id = s.subject_id
        AND r.visit_id IS NOT DISTINCT FROM s.visit_id AND r.replicate = s.replicate
      WHERE s.reason IS NULL AND NOT s.known`,
    [judging.studyId, applying.importId],
  );
  return written;
}
