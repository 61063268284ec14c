/** Queries on cuts. Every one is scoped by study: an id of another study finds nothing. */
import type { EntityManager } from 'typeorm';
import type { z } from 'zod';
import type {
  CutExclusion,
  CutSummary,
  cutListQuerySchema,
  cutMeasureSchema,
} from '../../contracts/cuts.ts';
import type { EndedSubject } from './assemble-cut.ts';
import type { LateReading, PendingVisit } from './cut-shapes.ts';

export type CutMeasure = z.infer<typeof cutMeasureSchema>;

export interface StoredDifference {
  against: { id: string; number: number; name: string };
  added: number;
  changed: number;
  gone: number;
}

export interface CutRowOfList {
  id: string;
  uid: string;
  number: number;
  name: string;
  visitCutoff: string;
  enteredUntil: Date;
  frozenAt: Date;
  frozenBy: string;
  rows: number;
  subjects: number;
  late: number;
  pending: number;
  sha256: string;
  measures: CutMeasure[];
}

/** What a cut says of itself beside its bytes, as it was when frozen. */
export interface StoredCut extends CutRowOfList {
  exclusions: CutExclusion[];
  includeWithdrawnReason: string | null;
  withdrawnLeftOut: { subjects: number; readings: number };
  lateRows: LateReading[];
  pendingRows: PendingVisit[];
  ended: EndedSubject[];
  groups: string[];
  difference: StoredDifference | null;
}

/** A list leaves out late and pending rows, which may be many. */
const SUMMARY_COLUMNS = `cut.id::text, cut.uid, cut.number, cut.name,
  cut.visit_cutoff::text AS "visitCutoff", cut.entered_until AS "enteredUntil",
  cut.frozen_at AS "frozenAt", frozen_by.name AS "frozenBy", cut.row_count::int AS rows,
  cut.subject_count::int AS subjects, cut.late_count::int AS late,
  cut.pending_count::int AS pending, cut.sha256, cut.measures`;

const FROM = 'FROM cut JOIN account frozen_by ON frozen_by.id = cut.frozen_by';

const SORT_COLUMNS: Record<z.infer<typeof cutListQuerySchema>['sort'], string> = {
  number: 'cut.number',
  name: 'lower(cut.name)',
  visitCutoff: 'cut.visit_cutoff',
  rows: 'cut.row_count',
  late: 'cut.late_count',
  pending: 'cut.pending_count',
  frozenAt: 'cut.frozen_at',
};

export async function findCut(
  manager: EntityManager,
  studyId: string,
  cutUid: string,
): Promise<StoredCut | null> {
  const [row]: StoredCut[] = await manager.query(
    `SELECT ${SUMMARY_COLUMNS}, cut.exclusions, cut.difference, cut.ended, cut.groups,
            cut.withdrawn_included_reason AS "includeWithdrawnReason",
            cut.withdrawn_left_out AS "withdrawnLeftOut",
            cut.late_rows AS "lateRows", cut.pending_rows AS "pendingRows"
       ${FROM} WHERE cut.study_id = $1 AND cut.uid = $2`,
    [studyId, cutUid],
  );
  return row ?? null;
}

export async function listCuts(
  manager: EntityManager,
  studyId: string,
  query: z.infer<typeof cutListQuerySchema>,
): Promise<{ rows: CutSummary[]; total: number }> {
  const where = `WHERE cut.study_id = $1 AND ($2::text IS NULL OR strpos(lower(cut.name), lower($2)) > 0
    OR cut.number::text = $2)`;
  const text = query.text?.trim() || null;
  const [count]: { total: number }[] = await manager.query(
    `SELECT count(*)::int AS total ${FROM} ${where}`,
    [studyId, text],
  );
  const rows: CutRowOfList[] = await manager.query(
    `SELECT ${SUMMARY_COLUMNS} ${FROM} ${where}
      ORDER BY ${SORT_COLUMNS[query.sort]} ${query.direction === 'asc' ? 'ASC' : 'DESC'},
               cut.number DESC
      LIMIT $3 OFFSET $4`,
    [studyId, text, query.pageSize, (query.page - 1) * query.pageSize],
  );
  return { rows: rows.map(toSummary), total: count?.total ?? 0 };
}

/** The cut frozen last, which the next one is compared with. */
export async function lastCut(
  manager: EntityManager,
  studyId: string,
): Promise<{ id: string; uid: string; number: number; name: string } | null> {
  const [row]: { id: string; uid: string; number: number; name: string }[] = await manager.query(
    `SELECT id::text, uid, number, name FROM cut WHERE study_id = $1 ORDER BY number DESC LIMIT 1`,
    [studyId],
  );
  return row ?? null;
}

/** Row of the database to the answer; the inner id stays inside. */
export function toSummary(row: CutRowOfList): CutSummary {
  return {
    id: row.uid,
    number: row.number,
    name: row.name,
    visitCutoff: row.visitCutoff,
    enteredUntil: row.enteredUntil.toISOString(),
    frozenAt: row.frozenAt.toISOString(),
    frozenBy: row.frozenBy,
    measures: row.measures,
    rows: row.rows,
    subjects: row.subjects,
    late: row.late,
    pending: row.pending,
    sha256: row.sha256,
  };
}
