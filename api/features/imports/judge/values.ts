/** Whether a value is new, held already, held differently, written twice, impossible or unlikely. */
import type { Judging, Query } from './judging.ts';

export async function judgeValues(query: Query, judging: Judging): Promise<void> {
  await compareWithHeld(query, judging);
  await query(
    `UPDATE staged_row s
        SET reason = 'row_duplicate', params = jsonb_build_object('line', d.first_line)
       FROM (SELECT line, first_value(line) OVER (
                      PARTITION BY subject_code, coalesce(visit_id::text, place), replicate ORDER BY line
                    ) AS first_line
               FROM staged_row WHERE reason IS NULL AND NOT known) d
      WHERE s.line = d.line AND d.line <> d.first_line`,
  );
  await query(
    `UPDATE staged_row s
        SET reason = 'row_impossible',
            params = jsonb_build_object('value', s.value_text,
              'low', coalesce(m.impossible_low::text, ''), 'high', coalesce(m.impossible_high::text, ''))
       FROM measure m
      WHERE s.reason IS NULL AND NOT s.known AND m.id = $1
        AND (coalesce(s.value, s.limit_value) < m.impossible_low
             OR coalesce(s.value, s.limit_value) > m.impossible_high)`,
    [judging.measureId],
  );
  await query(
    `UPDATE staged_row s SET implausible = true
       FROM measure m
      WHERE s.reason IS NULL AND NOT s.known AND m.id = $1
        AND (s.value < m.plausible_low OR s.value > m.plausible_high)`,
    [judging.measureId],
  );
}

async function compareWithHeld(query: Query, judging: Judging): Promise<void> {
  const held =
    judging.per === 'subject'
      ? 'r.visit_id IS NULL AND r.subject_id = s.subject_id'
      : 'r.visit_id = s.visit_id';
  await query(
    `UPDATE staged_row s SET known = true
       FROM reading r
      WHERE s.reason IS NULL AND NOT s.known AND ${held}
        AND r.measure_id = $1 AND r.replicate = s.replicate
        AND r.value IS NOT DISTINCT FROM s.value AND r.choice IS NOT DISTINCT FROM s.choice
        AND r.limit_sign IS NOT DISTINCT FROM s.limit_sign
        AND r.limit_value IS NOT DISTINCT FROM s.limit_value AND r.not_done IS NULL`,
    [judging.measureId],
  );
  await query(
    `UPDATE staged_row s
        SET reason = 'row_value_differs',
            params = jsonb_build_object('given', s.value_text, 'held',
              coalesce(r.value::text, r.choice, r.limit_sign || r.limit_value::text, 'not done: ' || r.not_done))
       FROM reading r
      WHERE s.reason IS NULL AND NOT s.known AND ${held}
        AND r.measure_id = $1 AND r.replicate = s.replicate`,
    [judging.measureId],
  );
}
