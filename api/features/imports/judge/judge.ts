/** Judges every staged row against the study, one question after the other, each for all rows at once. */
import type { ImportCounts } from '../../../contracts/imports.ts';
import type { Judging, Query } from './judging.ts';
import { judgeSubjects } from './subjects.ts';
import { judgeValues } from './values.ts';
import { judgeVisits, markKnown, placeRows } from './visits.ts';

export async function judgeRows(query: Query, judging: Judging): Promise<ImportCounts> {
  await judgeSubjects(query, judging);
  await placeRows(query, judging);
  // Before anything the study holds can refuse a row: what was applied once is never news.
  await markKnown(query, judging);
  await query('ANALYZE staged_row');
  await judgeVisits(query, judging);
  await judgeValues(query, judging);
  return countRows(query);
}

async function countRows(query: Query): Promise<ImportCounts> {
  const rows = (await query(`
    SELECT count(*)::int AS rows,
           count(*) FILTER (WHERE reason IS NULL AND NOT known)::int AS fresh,
           count(*) FILTER (WHERE reason IS NOT NULL)::int AS refused,
           count(*) FILTER (WHERE reason IS NULL AND known)::int AS known,
           count(*) FILTER (WHERE reason IS NULL AND NOT known AND implausible)::int AS implausible,
           (count(DISTINCT subject_code) FILTER (WHERE reason IS NULL AND NOT known AND is_new))::int AS "newSubjects",
           (count(DISTINCT (subject_code, place))
             FILTER (WHERE reason IS NULL AND NOT known AND visit_id IS NULL AND place <> 'subject'))::int AS "newVisits",
           (count(DISTINCT (subject_code, place))
             FILTER (WHERE reason IS NULL AND NOT known AND visit_id IS NULL AND place LIKE 'day:%'))::int AS unscheduled
      FROM staged_row`)) as ImportCounts[];
  const counts = rows[0];
  if (!counts) throw new Error('counting the staged rows gave no row');
  return counts;
}
