/** The readings of one subject as they are shown, by visit. */
import type { EntityManager } from 'typeorm';
import type { ReadingContent, ReadingView } from '../../contracts/subjects.ts';
import { isImplausible } from './check-content.ts';

interface Cells {
  value: number | null;
  choice: string | null;
  limit_sign: '<' | '>' | null;
  limit_value: number | null;
  not_done: string | null;
}

interface ReadingRow extends Cells {
  id: string;
  uid: string;
  visit_id: string | null;
  measure: string;
  replicate: number;
  plausible_low: number | null;
  plausible_high: number | null;
  explanation: string | null;
  import_uid: string | null;
  file_name: string | null;
  entered_by: string;
  entered_at: Date;
}

interface RevisionRow {
  reading_id: string;
  at: Date;
  by: string;
  old: Cells;
  new: Cells;
  reason: string;
  reason_text: string | null;
}

/** By the inner key of the visit; null holds what is taken once per subject. In the order of the set-up. */
export async function readReadings(
  manager: EntityManager,
  subjectId: string,
): Promise<Map<string | null, ReadingView[]>> {
  const rows: ReadingRow[] = await manager.query(
    `SELECT r.id, r.uid, r.visit_id, m.short_name AS measure, r.replicate, r.value, r.choice,
            r.limit_sign, r.limit_value, r.not_done, m.plausible_low, m.plausible_high, r.explanation,
            i.uid AS import_uid, i.file_name, a.name AS entered_by, r.entered_at
       FROM reading r
       JOIN measure m ON m.id = r.measure_id
       JOIN account a ON a.id = r.entered_by
       LEFT JOIN import i ON i.id = r.import_id
      WHERE r.subject_id = $1
      ORDER BY m.position, r.replicate`,
    [subjectId],
  );
  const revisions: RevisionRow[] = await manager.query(
    `SELECT v.reading_id, v.at, a.name AS by, v.reason, v.reason_text,
            json_build_object('value', v.old_value, 'choice', v.old_choice, 'limit_sign', v.old_limit_sign,
              'limit_value', v.old_limit_value, 'not_done', v.old_not_done) AS old,
            json_build_object('value', v.new_value, 'choice', v.new_choice, 'limit_sign', v.new_limit_sign,
              'limit_value', v.new_limit_value, 'not_done', v.new_not_done) AS new
       FROM reading_revision v
       JOIN reading r ON r.id = v.reading_id
       JOIN account a ON a.id = v.by_account
      WHERE r.subject_id = $1 ORDER BY v.id`,
    [subjectId],
  );
  const byReading = new Map<string, RevisionRow[]>();
  for (const revision of revisions) {
    const list = byReading.get(revision.reading_id) ?? [];
    list.push(revision);
    byReading.set(revision.reading_id, list);
  }
  const byVisit = new Map<string | null, ReadingView[]>();
  for (const row of rows) {
    const list = byVisit.get(row.visit_id) ?? [];
    list.push(readingView(row, byReading.get(row.id) ?? []));
    byVisit.set(row.visit_id, list);
  }
  return byVisit;
}

function readingView(row: ReadingRow, revisions: readonly RevisionRow[]): ReadingView {
  return {
    id: row.uid,
    measure: row.measure,
    replicate: row.replicate,
    ...contentOf(row),
    implausible: isImplausible(
      { plausibleLow: row.plausible_low, plausibleHigh: row.plausible_high },
      row.value,
    ),
    explanation: row.explanation,
    fromImport:
      row.import_uid !== null && row.file_name !== null
        ? { id: row.import_uid, fileName: row.file_name }
        : null,
    enteredBy: row.entered_by,
    enteredAt: row.entered_at.toISOString(),
    revisions: revisions.map((revision) => ({
      at: revision.at.toISOString(),
      by: revision.by,
      old: contentOf(revision.old),
      new: contentOf(revision.new),
      reason: revision.reason,
      reasonText: revision.reason_text,
    })),
  };
}

function contentOf(cells: Cells): ReadingContent {
  return {
    value: cells.value,
    choice: cells.choice,
    limit:
      cells.limit_sign !== null && cells.limit_value !== null
        ? { sign: cells.limit_sign, value: cells.limit_value }
        : null,
    notDone: cells.not_done,
  };
}
