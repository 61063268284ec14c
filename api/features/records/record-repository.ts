/** Queries on analysis records and their signatures; every one is scoped by study. */
import type { EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { Headline } from '../../analysis-threads/headline.ts';
import type {
  fits,
  purposes,
  recordListQuerySchema,
  SpecificationInput,
} from '../../contracts/analysis.ts';
import type { CutMeasure } from '../cuts/cut-repository.ts';

export const RECORD = 'analysis_record';

export interface RecordRow {
  uid: string;
  cutUid: string;
  cutNumber: number;
  cutName: string;
  visitCutoff: string;
  cutSha256: string;
  cutMeasures: CutMeasure[];
  measure: string;
  axis: SpecificationInput['axis'];
  unit: SpecificationInput['unit'];
  group: boolean;
  specificationSha256: string;
  specificationNumber: number;
  fit: (typeof fits)[number];
  purpose: (typeof purposes)[number];
  createdBy: string;
  createdByUid: string;
  createdAt: Date;
  engine: string;
  seed: number;
  contentSha256: string;
  stamp: string | null;
  headline: Headline;
  signed: boolean;
}

/** With the texts, which may be long. */
export interface StoredRecord extends RecordRow {
  checkText: string;
  resultText: string;
  pictureText: string | null;
  acknowledgedBy: string | null;
  acknowledgedAt: Date | null;
  acknowledgedReason: string | null;
}

export interface StoredSignature {
  accountUid: string;
  name: string;
  at: Date;
  zone: string;
  meaning: string;
  contentSha256: string;
}

const COLUMNS = `r.uid, cut.uid AS "cutUid", cut.number AS "cutNumber", cut.name AS "cutName",
  cut.visit_cutoff::text AS "visitCutoff", cut.sha256 AS "cutSha256",
  cut.measures AS "cutMeasures", s.measure, s.axis, s.unit, s.group_by AS "group",
  s.sha256 AS "specificationSha256", s.number AS "specificationNumber", r.fit, r.purpose,
  author.name AS "createdBy", author.uid AS "createdByUid", r.created_at AS "createdAt",
  r.engine_version AS engine, r.seed::float8 AS seed, r.content_sha256 AS "contentSha256",
  r.stamp, r.headline,
  EXISTS (SELECT 1 FROM signature g WHERE g.entity_kind = '${RECORD}' AND g.entity_uid = r.uid)
    AS signed`;

const FROM = `FROM analysis_record r
  JOIN cut ON cut.id = r.cut_id
  JOIN specification s ON s.id = r.specification_id
  JOIN account author ON author.id = r.created_by`;

const SORT_COLUMNS: Record<z.infer<typeof recordListQuerySchema>['sort'], string> = {
  at: 'r.created_at',
  measure: 's.measure',
  cut: 'cut.number',
  specification: 's.number',
  fit: 'r.fit',
  purpose: 'r.purpose',
  by: 'lower(author.name)',
};

export async function listRecords(
  manager: EntityManager,
  studyId: string,
  query: z.infer<typeof recordListQuerySchema>,
): Promise<{ rows: RecordRow[]; total: number }> {
  const where = `WHERE r.study_id = $1
    AND ($2::text IS NULL OR s.measure = $2)
    AND ($3::text IS NULL OR cut.uid::text = $3)
    AND ($4::text IS NULL OR r.fit = $4)
    AND ($5::text IS NULL OR r.purpose = $5)
    AND ($6::boolean IS NULL OR $6 = EXISTS (SELECT 1 FROM signature g
          WHERE g.entity_kind = '${RECORD}' AND g.entity_uid = r.uid))`;
  const filters = [
    studyId,
    query.measure || null,
    query.cut?.toLowerCase() || null,
    query.fit ?? null,
    query.purpose ?? null,
    query.signed === undefined ? null : query.signed === 'yes',
  ];
  const [count]: { total: number }[] = await manager.query(
    `SELECT count(*)::int AS total ${FROM} ${where}`,
    filters,
  );
  const rows: RecordRow[] = await manager.query(
    `SELECT ${COLUMNS} ${FROM} ${where}
      ORDER BY ${SORT_COLUMNS[query.sort]} ${query.direction === 'asc' ? 'ASC' : 'DESC'}, r.id DESC
      LIMIT $7 OFFSET $8`,
    [...filters, query.pageSize, (query.page - 1) * query.pageSize],
  );
  return { rows, total: count?.total ?? 0 };
}

export async function findRecord(
  manager: EntityManager,
  studyId: string,
  recordUid: string,
): Promise<StoredRecord | null> {
  const [row]: StoredRecord[] = await manager.query(
    `SELECT ${COLUMNS}, r.check_text AS "checkText", r.result_text AS "resultText",
            r.picture_text AS "pictureText", a.reason AS "acknowledgedReason",
            a.at AS "acknowledgedAt", who.name AS "acknowledgedBy"
       ${FROM}
       LEFT JOIN acknowledgement a ON a.id = r.acknowledgement_id
       LEFT JOIN account who ON who.id = a.account_id
      WHERE r.study_id = $1 AND r.uid = $2`,
    [studyId, recordUid],
  );
  return row ?? null;
}

export async function signaturesOf(
  manager: EntityManager,
  recordUid: string,
): Promise<StoredSignature[]> {
  return manager.query(
    `SELECT account.uid AS "accountUid", g.signed_name AS name, g.signed_at AS at, g.zone,
            g.meaning, g.content_sha256 AS "contentSha256"
       FROM signature g JOIN account ON account.id = g.account_id
      WHERE g.entity_kind = '${RECORD}' AND g.entity_uid = $1 ORDER BY g.id`,
    [recordUid],
  );
}
