/** An import as it is kept, and as it is answered. */
import type { EntityManager } from 'typeorm';
import type { ImportView } from '../../contracts/imports.ts';
import { Problem } from '../../http/problems.ts';

export type ImportRow = {
  id: string;
  uid: string;
  study_id: string;
  account_id: string;
  measure_id: string;
  measure_uid: string;
  short_name: string;
  label: string;
  unit: string | null;
  nature: 'continuous' | 'positive' | 'count' | 'yes_no' | 'choice';
  per: 'visit' | 'subject';
  choices: { code: string; label: string }[] | null;
  plausible_low: number | null;
  plausible_high: number | null;
  file_name: string;
  file_size: string;
  file_hash: string;
  file_rows: number;
  object_key: string;
  state: ImportView['state'];
  delimiter: string;
  columns: ImportView['columns'];
  mapping: ImportView['mapping'];
  suggested_mapping: ImportView['suggestedMapping'];
  counts: ImportView['counts'];
  explanation: string | null;
  keep_implausible: boolean | null;
  problem: ImportView['problem'];
  uploaded_by: string;
  created_at: Date;
  applied_at: Date | null;
  job_uid: string | null;
  version: number;
};

export const IMPORT_SELECT = `
  SELECT i.*, m.uid AS measure_uid, m.short_name, m.label, m.unit, m.nature, m.per, m.choices,
         m.plausible_low, m.plausible_high, a.name AS uploaded_by
    FROM import i
    JOIN measure m ON m.id = i.measure_id
    JOIN account a ON a.id = i.account_id`;

export function importView(row: ImportRow): ImportView {
  return {
    id: row.uid,
    measure: { id: row.measure_uid, shortName: row.short_name, label: row.label, unit: row.unit },
    fileName: row.file_name,
    fileSize: Number(row.file_size),
    fileSha256: row.file_hash,
    fileRows: row.file_rows,
    state: row.state,
    delimiter: row.delimiter,
    columns: row.columns,
    mapping: row.mapping,
    suggestedMapping: row.suggested_mapping,
    counts: row.counts,
    explanation: row.explanation,
    keepImplausible: row.keep_implausible,
    problem: row.problem,
    uploadedBy: row.uploaded_by,
    uploadedAt: row.created_at.toISOString(),
    appliedAt: row.applied_at?.toISOString() ?? null,
    jobId: row.job_uid,
    version: row.version,
  };
}

type Queries = Pick<EntityManager, 'query'>;

/** @throws Problem `not_found` for an import of another person too: the refused rows of a file are theirs */
export async function importOf(
  db: Queries,
  scope: { studyId: string; accountId: string },
  uid: string,
  lock = false,
): Promise<ImportRow> {
  const rows: ImportRow[] = await db.query(
    `${IMPORT_SELECT} WHERE i.uid = $1 AND i.study_id = $2 AND i.account_id = $3 ${lock ? 'FOR UPDATE OF i' : ''}`,
    [uid, scope.studyId, scope.accountId],
  );
  const row = rows[0];
  if (!row) throw new Problem('not_found');
  return row;
}
