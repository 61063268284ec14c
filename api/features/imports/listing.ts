/** Reading imports and their rows. */
import type { DataSource } from 'typeorm';
import type { z } from 'zod';
import type {
  implausibleRowsSchema,
  importChoicesSchema,
  importListQuerySchema,
  importListSchema,
  refusedRowsSchema,
} from '../../contracts/imports.ts';
import { csvLine } from '../../http/files.ts';
import type { StudyMembership } from '../../http/membership.ts';
import { fillSentence } from '../../http/problems.ts';
import { type RowRefusalCode, rowRefusalWords } from '../../words/imports.ts';
import { IMPORT_SELECT, type ImportRow, importView } from './rows.ts';

type Scope = { studyId: string; accountId: string };

const ORDER: Record<z.infer<typeof importListQuerySchema>['sort'], string> = {
  uploadedAt: 'i.id',
  fileName: 'i.file_name',
  measure: 'm.label',
  state: 'i.state',
};

export async function listImports(
  db: DataSource,
  scope: Scope,
  query: z.infer<typeof importListQuerySchema>,
): Promise<z.infer<typeof importListSchema>> {
  const where =
    'WHERE i.study_id = $1 AND i.account_id = $2 AND ($3::text IS NULL OR i.state = $3)';
  const params = [scope.studyId, scope.accountId, query.state ?? null];
  const direction = query.direction === 'asc' ? 'ASC' : 'DESC';
  const rows: ImportRow[] = await db.query(
    `${IMPORT_SELECT} ${where} ORDER BY ${ORDER[query.sort]} ${direction}, i.id DESC LIMIT $4 OFFSET $5`,
    [...params, query.pageSize, (query.page - 1) * query.pageSize],
  );
  const [count]: { total: number }[] = await db.query(
    `SELECT count(*)::int AS total FROM import i ${where}`,
    params,
  );
  return { rows: rows.map(importView), total: count?.total ?? 0 };
}

type RefusalRow = {
  line: number;
  subject: string;
  value: string;
  reason_code: string;
  params: Record<string, string | number>;
};

export async function listRefusals(
  db: DataSource,
  importId: string,
  page: { page: number; pageSize: number },
): Promise<z.infer<typeof refusedRowsSchema>> {
  const rows: RefusalRow[] = await db.query(
    `SELECT line, subject, value, reason_code, params FROM import_refusal
      WHERE import_id = $1 ORDER BY line LIMIT $2 OFFSET $3`,
    [importId, page.pageSize, (page.page - 1) * page.pageSize],
  );
  const [count]: { total: number }[] = await db.query(
    'SELECT count(*)::int AS total FROM import_refusal WHERE import_id = $1',
    [importId],
  );
  return {
    rows: rows.map((row) => ({
      line: row.line,
      subject: row.subject,
      value: row.value,
      reason: { code: row.reason_code, params: row.params },
    })),
    total: count?.total ?? 0,
  };
}

const LINES_A_PIECE = 2000;

/** The refused rows as CSV, piece by piece: a large file may be refused whole. */
export async function* refusalLines(db: DataSource, importId: string): AsyncGenerator<string> {
  yield csvLine(['line', 'subject', 'value', 'reason']);
  let after = 0;
  for (;;) {
    const rows: RefusalRow[] = await db.query(
      `SELECT line, subject, value, reason_code, params FROM import_refusal
        WHERE import_id = $1 AND line > $2 ORDER BY line LIMIT ${LINES_A_PIECE}`,
      [importId, after],
    );
    const last = rows.at(-1);
    if (!last) return;
    after = last.line;
    yield rows.map((row) => csvLine([row.line, row.subject, row.value, sentenceOf(row)])).join('');
  }
}

function sentenceOf(row: RefusalRow): string {
  const words = rowRefusalWords[row.reason_code as RowRefusalCode];
  if (!words) throw new Error(`no words for the refusal ${row.reason_code}`);
  return fillSentence(words, row.params);
}

export async function listImplausible(
  db: DataSource,
  row: ImportRow,
  page: { page: number; pageSize: number },
): Promise<z.infer<typeof implausibleRowsSchema>> {
  const rows: { line: number; subject: string; visit: string; value: number }[] = await db.query(
    `SELECT line, subject, visit, value FROM import_implausible
      WHERE import_id = $1 ORDER BY line LIMIT $2 OFFSET $3`,
    [row.id, page.pageSize, (page.page - 1) * page.pageSize],
  );
  const [count]: { total: number }[] = await db.query(
    'SELECT count(*)::int AS total FROM import_implausible WHERE import_id = $1',
    [row.id],
  );
  const range = { plausibleLow: row.plausible_low, plausibleHigh: row.plausible_high };
  return { rows: rows.map((value) => ({ ...value, ...range })), total: count?.total ?? 0 };
}

export async function importChoices(
  db: DataSource,
  membership: StudyMembership,
): Promise<z.infer<typeof importChoicesSchema>> {
  const [measures, sites, plannedVisits] = await Promise.all([
    db.query(
      `SELECT uid AS id, short_name AS "shortName", label, unit, nature, per
         FROM measure WHERE study_id = $1 ORDER BY position, id`,
      [membership.studyId],
    ),
    db.query(
      'SELECT code, name FROM site WHERE study_id = $1 AND id = ANY($2::bigint[]) ORDER BY code',
      [membership.studyId, membership.siteIds],
    ),
    db.query(
      `SELECT name, target_day AS "targetDay" FROM planned_visit WHERE study_id = $1 ORDER BY target_day`,
      [membership.studyId],
    ),
  ]);
  return { measures, sites, plannedVisits };
}
