/** Whose readings these are. */
import type { Judging, Query } from './judging.ts';

export async function judgeSubjects(query: Query, judging: Judging): Promise<void> {
  const { studyId, siteIds, enrolsNew, now } = judging;
  await query('CREATE INDEX ON staged_row (subject_code)');
  await query(
    `UPDATE staged_row s
        SET subject_id = x.id, site_id = x.site_id,
            consent_date = x.consent_date, baseline_date = x.baseline_date
       FROM subject x
      WHERE s.reason IS NULL AND x.study_id = $1 AND x.code = s.subject_code
        AND x.site_id = ANY($2::bigint[])`,
    [studyId, siteIds],
  );
  // A subject of another site is refused in the words for an unknown one, also where new ones are enrolled.
  await query(
    `UPDATE staged_row s
        SET reason = 'row_subject_unknown', params = jsonb_build_object('subject', s.subject_code)
      WHERE s.reason IS NULL AND s.subject_id IS NULL
        AND (NOT $2 OR EXISTS (SELECT 1 FROM subject x WHERE x.study_id = $1 AND x.code = s.subject_code))`,
    [studyId, enrolsNew],
  );
  await query(
    `UPDATE staged_row s
        SET reason = 'row_site_differs',
            params = jsonb_build_object('given', s.site_given, 'held', site.code)
       FROM site
      WHERE s.reason IS NULL AND site.id = s.site_id AND s.site_given <> site.code`,
  );
  if (enrolsNew) await judgeNewSubjects(query, studyId, siteIds, now);
}

async function judgeNewSubjects(
  query: Query,
  studyId: string,
  siteIds: string[],
  now: Date,
): Promise<void> {
  await query(
    `UPDATE staged_row
        SET is_new = true, consent_date = new_consent_date, baseline_date = new_baseline_date
      WHERE reason IS NULL AND subject_id IS NULL`,
  );
  await query(
    `UPDATE staged_row SET reason = new_reason, params = new_params
      WHERE reason IS NULL AND is_new AND new_reason IS NOT NULL`,
  );
  await query(
    `UPDATE staged_row s SET site_id = site.id
       FROM site
      WHERE s.reason IS NULL AND s.is_new AND site.study_id = $1 AND site.code = s.new_site
        AND site.id = ANY($2::bigint[])`,
    [studyId, siteIds],
  );
  await query(
    `UPDATE staged_row
        SET reason = 'row_site_unknown', params = jsonb_build_object('site', new_site)
      WHERE reason IS NULL AND is_new AND site_id IS NULL`,
  );
  await query(
    `UPDATE staged_row
        SET reason = 'row_site_differs',
            params = jsonb_build_object('given', site_given, 'held', new_site)
      WHERE reason IS NULL AND is_new AND site_given <> new_site`,
  );
  await query(
    `UPDATE staged_row s
        SET reason = 'row_new_subject_differs',
            params = jsonb_build_object('subject', s.subject_code, 'line', d.first_line)
       FROM (SELECT subject_code, min(line) AS first_line
               FROM staged_row
              WHERE reason IS NULL AND is_new
              GROUP BY subject_code
             HAVING count(DISTINCT (new_site, new_consent_version, new_consent_date, new_baseline_date)) > 1
            ) d
      WHERE s.reason IS NULL AND s.subject_code = d.subject_code`,
  );
  await query(
    `UPDATE staged_row s
        SET reason = CASE
              WHEN s.new_consent_date > t.today THEN 'row_consent_future'
              WHEN s.new_baseline_date > t.today THEN 'row_baseline_future'
              ELSE 'row_baseline_before_consent' END,
            params = jsonb_build_object('consent', s.new_consent_date, 'baseline', s.new_baseline_date)
       FROM (SELECT id, ($1::timestamptz AT TIME ZONE time_zone)::date AS today FROM site) t
      WHERE s.reason IS NULL AND s.is_new AND t.id = s.site_id
        AND (s.new_consent_date > t.today OR s.new_baseline_date > t.today
             OR s.new_baseline_date < s.new_consent_date)`,
    [now],
  );
}
