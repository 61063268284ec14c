/** The long work of an import: the dry run, and the run that writes. Both judge every row afresh. */
import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { PoolClient } from 'pg';
import type { DataSource, EntityManager } from 'typeorm';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction, type Tx } from '../../audit/transaction.ts';
import type { ImportCounts } from '../../contracts/imports.ts';
import type { AppDeps } from '../../http/deps.ts';
import { membershipOf, type StudyMembership } from '../../http/membership.ts';
import { FileProblem } from '../../import-threads/file-problem.ts';
import type { Delimiter } from '../../import-threads/rows-of.ts';
import { defineJob, type JobDefinition, type JobRun } from '../../jobs/jobs.ts';
import { applyRows } from './apply-rows.ts';
import { judgeRows } from './judge/judge.ts';
import type { Judging, Query } from './judge/judging.ts';
import { copyIntoStaging, createStaging } from './judge/staging.ts';
import { IMPORT_SELECT, type ImportRow } from './rows.ts';
import { APPLY_JOB, CHECK_JOB } from './service.ts';

type WorkDeps = Pick<AppDeps, 'databases' | 'store' | 'clock' | 'importThreads'>;

/** Thrown inside a transaction to undo it; not a failure. */
class Cancelled extends Error {}
class StudyChanged extends Error {}

export function importJobs(deps: WorkDeps): JobDefinition[] {
  return [
    defineJob(CHECK_JOB, (run) => guarded(deps, run, 'checking', () => check(deps, run))),
    defineJob(APPLY_JOB, (run) => guarded(deps, run, 'applying', () => apply(deps, run))),
  ];
}

/** Turns what can go wrong into a state of the import that its page can explain. */
async function guarded(
  deps: WorkDeps,
  run: JobRun,
  during: 'checking' | 'applying',
  work: () => Promise<void>,
): Promise<void> {
  const db = deps.databases.masked;
  const leave = (state: string, problem: { code: string; params: object } | null) =>
    db.query(
      `UPDATE import SET state = $2, problem = $3, version = version + 1 WHERE uid = $1 AND state = $4`,
      [run.subjectUid, state, problem ? JSON.stringify(problem) : null, during],
    );
  try {
    await work();
  } catch (error) {
    if (error instanceof Cancelled) {
      // Stopped through its job: the import waits where it stood before the work began.
      await leave(during === 'checking' ? 'uploaded' : 'checked', null);
      return;
    }
    if (error instanceof StudyChanged) {
      await leave('uploaded', { code: 'import_changed', params: {} });
    } else if (error instanceof FileProblem) {
      await leave('failed', { code: error.code, params: error.params });
    } else {
      await leave('failed', { code: 'import_failed', params: {} });
      throw error;
    }
  }
}

async function check(deps: WorkDeps, run: JobRun): Promise<void> {
  const { row, membership, actor } = await partiesOf(deps.databases.masked, run);
  if (row.state !== 'checking') return;
  await inTransaction(deps.databases.masked, actor, async (tx) => {
    const judging = judgingOf(row, membership, deps.clock());
    const counts = await stageAndJudge(deps, tx.manager, row, judging, run);
    await tx.manager.query('DELETE FROM import_refusal WHERE import_id = $1', [row.id]);
    await tx.manager.query('DELETE FROM import_implausible WHERE import_id = $1', [row.id]);
    await tx.manager.query(
      `INSERT INTO import_refusal (import_id, line, subject, value, reason_code, params)
       SELECT $1, line, subject_code, value_text, reason, coalesce(params, '{}')
         FROM staged_row WHERE reason IS NOT NULL`,
      [row.id],
    );
    await tx.manager.query(
      `INSERT INTO import_implausible (import_id, line, subject, visit, value)
       SELECT $1, s.line, s.subject_code, coalesce(p.name, s.on_date::text, ''), s.value
         FROM staged_row s LEFT JOIN planned_visit p ON p.id = s.planned_visit_id
        WHERE s.reason IS NULL AND NOT s.known AND s.implausible`,
      [row.id],
    );
    await stillWanted(tx, row, 'checking');
    // A repeat that brings nothing is finished here; there is nothing left to decide.
    const nothingNew = counts.fresh === 0 && counts.refused === 0;
    await finish(tx, deps, row, membership, counts, nothingNew ? 'nothing new' : 'checked', null);
  });
}

async function apply(deps: WorkDeps, run: JobRun): Promise<void> {
  const { row, membership, actor } = await partiesOf(deps.databases.masked, run);
  if (row.state !== 'applying') return;
  await inTransaction(deps.databases.masked, actor, async (tx) => {
    // Two imports into one study judge one after the other, never side by side.
    await tx.manager.query(`SELECT pg_advisory_xact_lock(hashtext('import'), $1::bigint::int)`, [
      membership.studyId,
    ]);
    await holdOpen(tx, membership);
    const judging = judgingOf(row, membership, deps.clock());
    const counts = await stageAndJudge(deps, tx.manager, row, judging, run);
    if (JSON.stringify(inOrder(counts)) !== JSON.stringify(inOrder(row.counts)))
      throw new StudyChanged();
    if (await run.cancelled()) throw new Cancelled();
    const applied = await applyRows((sql, params) => tx.manager.query(sql, params), judging, {
      importId: row.id,
      accountId: actor.accountId,
      keepImplausible: row.keep_implausible ?? false,
      explanation: row.explanation,
    });
    await stillWanted(tx, row, 'applying');
    const state = applied.readings === 0 ? 'nothing new' : 'applied';
    await finish(tx, deps, row, membership, counts, state, applied);
  });
}

async function finish(
  tx: Tx,
  deps: WorkDeps,
  row: ImportRow,
  membership: StudyMembership,
  counts: ImportCounts,
  state: 'checked' | 'nothing new' | 'applied',
  applied: { readings: number; subjects: number; visits: number; hash: string } | null,
): Promise<void> {
  const at = deps.clock();
  await tx.manager.query(
    `UPDATE import SET state = $2, counts = $3, applied_hash = $4, version = version + 1,
            checked_at = coalesce(checked_at, $5), applied_at = CASE WHEN $2 = 'checked' THEN NULL ELSE $5 END
      WHERE id = $1`,
    [row.id, state, JSON.stringify(counts), applied?.hash ?? null, at],
  );
  if (state === 'checked') return;
  tx.audit({
    at,
    studyUid: membership.studyUid,
    action: state === 'applied' ? 'import applied' : 'nothing new',
    entity: 'import',
    entityUid: row.uid,
    after: {
      fileSha256: row.file_hash,
      measure: row.short_name,
      rows: counts.rows,
      readings: applied?.readings ?? 0,
      subjects: applied?.subjects ?? 0,
      visits: applied?.visits ?? 0,
      appliedRowsSha256: applied?.hash ?? null,
    },
    reason: row.explanation,
  });
}

/** Takes the row lock that a cancelling person takes too, and asks whether they came first. */
async function stillWanted(tx: Tx, row: ImportRow, state: string): Promise<void> {
  const [held]: { state: string }[] = await tx.manager.query(
    'SELECT state FROM import WHERE id = $1 FOR UPDATE',
    [row.id],
  );
  if (held?.state !== state) throw new Cancelled();
}

/** Keeps the study from being locked or closed half-way; one that is so already takes nothing more. */
async function holdOpen(tx: Tx, { studyId }: StudyMembership): Promise<void> {
  const [study]: { state: string }[] = await tx.manager.query(
    'SELECT state FROM study WHERE id = $1 FOR SHARE',
    [studyId],
  );
  if (study?.state !== 'open') throw new StudyChanged();
}

async function stageAndJudge(
  deps: WorkDeps,
  manager: EntityManager,
  row: ImportRow,
  judging: Judging,
  run: JobRun,
): Promise<ImportCounts> {
  const mapping = row.mapping;
  if (!mapping) throw new Error('an import without a mapping was sent to work');
  const query: Query = (sql, params) => manager.query(sql, params);
  const client = (await manager.queryRunner?.connect()) as PoolClient;
  const folder = await mkdtemp(join(tmpdir(), 'tetherline-import-'));
  try {
    const path = join(folder, 'file');
    await pipeline(await deps.store.get(row.object_key), createWriteStream(path));
    await createStaging(query);
    const pieces = deps.importThreads.pieces({
      path,
      delimiter: row.delimiter as Delimiter,
      mapping,
      measure: {
        nature: row.nature,
        per: row.per,
        choices: (row.choices ?? []).map((choice) => choice.code),
      },
    });
    await copyIntoStaging(client, pieces, async (rows) => {
      await run.progress(rows, row.file_rows);
      if (await run.cancelled()) throw new Cancelled();
    });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
  return judgeRows(query, judging);
}

function judgingOf(row: ImportRow, membership: StudyMembership, now: Date): Judging {
  return {
    studyId: membership.studyId,
    studyUid: membership.studyUid,
    measureId: row.measure_id,
    measureUid: row.measure_uid,
    per: row.per,
    when: row.per === 'subject' ? null : (row.mapping?.when?.kind ?? null),
    enrolsNew: row.mapping?.newSubjects != null,
    siteIds: membership.siteIds,
    now,
  };
}

/** Who asked, in the duties they have now: a removed coordinator's import stops here. */
async function partiesOf(
  db: DataSource,
  run: JobRun,
): Promise<{ row: ImportRow; membership: StudyMembership; actor: Actor }> {
  const [row]: ImportRow[] = await db.query(`${IMPORT_SELECT} WHERE i.uid = $1`, [run.subjectUid]);
  if (!row) throw new Error('the import of this job is gone');
  const [who]: { uid: string; name: string; study_uid: string }[] = await db.query(
    'SELECT a.uid, a.name, s.uid AS study_uid FROM account a, study s WHERE a.id = $1 AND s.id = $2',
    [row.account_id, row.study_id],
  );
  const membership = who ? await membershipOf(db, row.account_id, who.study_uid) : null;
  if (!who || !membership?.roles.includes('coordinator') || membership.studyState !== 'open') {
    throw new Error('the person who asked for this import may no longer do it');
  }
  const actor: Actor = {
    accountId: row.account_id,
    accountUid: who.uid,
    name: who.name,
    role: 'coordinator',
    sessionUid: null,
    requestId: run.jobUid,
  };
  return { row, membership, actor };
}

const inOrder = (counts: ImportCounts | null) =>
  counts && [
    counts.rows,
    counts.fresh,
    counts.refused,
    counts.known,
    counts.implausible,
    counts.newSubjects,
  ];
