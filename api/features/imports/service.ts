/** Uploading, mapping and the acts on an import; the work itself is in work.ts. */
import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import type { DataSource } from 'typeorm';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { ImportMapping, ImportView } from '../../contracts/imports.ts';
import type { AppDeps } from '../../http/deps.ts';
import type { StudyMembership } from '../../http/membership.ts';
import { Problem } from '../../http/problems.ts';
import { FileProblem } from '../../import-threads/file-problem.ts';
import { auditRefusal } from '../subjects/study-act.ts';
import { type ImportRow, importOf, importView } from './rows.ts';
import { suggestMapping } from './suggest-mapping.ts';
import { sha256OfFile, type Upload } from './upload.ts';

export const CHECK_JOB = 'import-check';
export const APPLY_JOB = 'import-apply';

export type ImportContext = {
  db: DataSource;
  deps: Pick<AppDeps, 'store' | 'clock' | 'jobs' | 'importThreads'>;
  actor: Actor;
  membership: StudyMembership;
};

const scopeOf = ({ actor, membership }: ImportContext) => ({
  studyId: membership.studyId,
  accountId: actor.accountId,
});

/** That it was tried after the lock stays in the trail, as with every other act in a study. */
async function refuseUnlessOpen({ db, deps, actor, membership }: ImportContext): Promise<void> {
  const { studyUid, studyState: state } = membership;
  if (state === 'open') return;
  const problem = new Problem('study_not_open', { state });
  await auditRefusal({ db, actor, clock: deps.clock, studyUid }, problem);
  throw problem;
}

export async function uploadImport(context: ImportContext, upload: Upload): Promise<ImportView> {
  const { db, deps, membership } = context;
  await refuseUnlessOpen(context);
  const measures: { id: string; short_name: string; label: string; per: 'visit' | 'subject' }[] =
    await db.query(
      'SELECT id, short_name, label, per FROM measure WHERE study_id = $1 AND uid::text = $2',
      [membership.studyId, upload.fields.measure ?? ''],
    );
  const measure = measures[0];
  if (!measure)
    throw new Problem('import_measure_unknown', {}, { errors: [{ path: 'measure', message: '' }] });
  const secretNames = await armNames(context);
  refuseNamedForArm(upload.name, secretNames);
  const inspection = await inspect(context, upload.path, secretNames);
  const hash = await sha256OfFile(upload.path);
  const key = `imports/${randomUUID()}`;
  await deps.store.put(key, createReadStream(upload.path), { size: upload.size, type: 'text/csv' });
  const suggested = suggestMapping(inspection.columns, {
    shortName: measure.short_name,
    label: measure.label,
    per: measure.per,
  });
  const [written]: { uid: string }[] = await db.query(
    `INSERT INTO import (study_id, account_id, measure_id, file_name, file_hash, file_size, file_rows, object_key,
                         state, delimiter, columns, suggested_mapping, created_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, 'uploaded', $9, $10, $11, $12) RETURNING uid`,
    [
      membership.studyId,
      context.actor.accountId,
      measure.id,
      upload.name,
      hash,
      upload.size,
      inspection.rows,
      key,
      inspection.delimiter,
      JSON.stringify(inspection.columns),
      JSON.stringify(suggested),
      deps.clock(),
    ],
  );
  if (!written) throw new Error('the import was not written');
  return importView(await importOf(db, scopeOf(context), written.uid));
}

/** In a masked study a column of arm names would carry the allocation in. */
async function armNames({ db, membership }: ImportContext): Promise<string[]> {
  if (!membership.masked) return [];
  const arms: { name: string }[] = await db.query('SELECT name FROM arm WHERE study_id = $1', [
    membership.studyId,
  ]);
  return arms.map((arm) => arm.name);
}

/** The name of a file stands beside every reading that came with it, so it may not tell an arm either. */
function refuseNamedForArm(fileName: string, secretNames: readonly string[]): void {
  const wordsOf = (text: string) => {
    const found = text.toLowerCase().match(/[\p{L}\p{N}]+/gu) ?? [];
    return ` ${found.join(' ')} `;
  };
  if (secretNames.some((name) => wordsOf(fileName).includes(wordsOf(name)))) {
    throw new Problem('import_file_named_for_arm', {}, { errors: [{ path: 'file', message: '' }] });
  }
}

async function inspect(context: ImportContext, path: string, secretNames: string[]) {
  try {
    return await context.deps.importThreads.inspect({ path, secretNames });
  } catch (error) {
    if (error instanceof FileProblem) throw new Problem(error.code, error.params, { cause: error });
    throw error;
  }
}

export async function checkImport(
  context: ImportContext,
  uid: string,
  body: { mapping: ImportMapping; version: number },
): Promise<ImportView> {
  const { db, deps, actor, membership } = context;
  await refuseUnlessOpen(context);
  await inTransaction(db, actor, async (tx) => {
    const row = await importOf(tx.manager, scopeOf(context), uid, true);
    refuseUnlessIdle(row);
    refuseStale(row, body.version);
    refuseUnusable(row, body.mapping);
    const job = await deps.jobs.start(tx.manager, {
      kind: CHECK_JOB,
      subjectUid: row.uid,
      studyId: membership.studyId,
      accountId: actor.accountId,
    });
    await tx.manager.query(
      `UPDATE import SET state = 'checking', mapping = $2, job_uid = $3, problem = NULL, counts = NULL,
              version = version + 1 WHERE id = $1`,
      [row.id, JSON.stringify(body.mapping), job],
    );
  });
  return importView(await importOf(db, scopeOf(context), uid));
}

export async function applyImport(
  context: ImportContext,
  uid: string,
  body: { keepImplausible: boolean; explanation: string | null; version: number },
): Promise<ImportView> {
  const { db, deps, actor, membership } = context;
  await refuseUnlessOpen(context);
  await inTransaction(db, actor, async (tx) => {
    const row = await importOf(tx.manager, scopeOf(context), uid, true);
    refuseUnlessIdle(row);
    refuseStale(row, body.version);
    if (row.state !== 'checked' || !row.counts) {
      throw new Problem('import_not_checked', { state: row.state });
    }
    if (row.counts.fresh === 0 && row.counts.known === 0) {
      throw new Problem('import_nothing_to_apply');
    }
    const job = await deps.jobs.start(tx.manager, {
      kind: APPLY_JOB,
      subjectUid: row.uid,
      studyId: membership.studyId,
      accountId: actor.accountId,
    });
    await tx.manager.query(
      `UPDATE import SET state = 'applying', keep_implausible = $2, explanation = $3, job_uid = $4,
              problem = NULL, version = version + 1 WHERE id = $1`,
      [row.id, body.keepImplausible, body.keepImplausible ? body.explanation : null, job],
    );
  });
  return importView(await importOf(db, scopeOf(context), uid));
}

/** Ends an import that has not been applied; work under way stops at its next step and writes nothing. */
export async function cancelImport(context: ImportContext, uid: string): Promise<ImportView> {
  const { db, deps, actor, membership } = context;
  const ended = await inTransaction(db, actor, async (tx) => {
    const row = await importOf(tx.manager, scopeOf(context), uid, true);
    if (isEnded(row.state)) throw new Problem('import_ended', { state: row.state });
    if (row.job_uid !== null) {
      await tx.manager.query('UPDATE job SET cancel_requested = true WHERE uid = $1', [
        row.job_uid,
      ]);
    }
    // The work asks for this state before it writes, under the same row lock.
    await tx.manager.query(
      `UPDATE import SET state = 'cancelled', version = version + 1 WHERE id = $1`,
      [row.id],
    );
    tx.audit({
      at: deps.clock(),
      studyUid: membership.studyUid,
      action: 'import cancelled',
      entity: 'import',
      entityUid: row.uid,
      after: { fileSha256: row.file_hash },
    });
    return row;
  });
  await deps.store.delete(ended.object_key);
  return importView(await importOf(db, scopeOf(context), uid));
}

const isEnded = (state: ImportRow['state']) =>
  state === 'applied' || state === 'nothing new' || state === 'cancelled';

function refuseUnlessIdle(row: ImportRow): void {
  if (isEnded(row.state)) throw new Problem('import_ended', { state: row.state });
  if (row.state === 'checking' || row.state === 'applying') throw new Problem('import_busy');
}

function refuseStale(row: ImportRow, given: number): void {
  if (row.version !== given) throw new Problem('stale_version', { given, held: row.version });
}

/** The mapping has to name columns that exist, each for one thing. */
function refuseUnusable(row: ImportRow, mapping: ImportMapping): void {
  if (row.per === 'visit' && mapping.when === null) {
    throw new Problem(
      'import_when_missing',
      {},
      { errors: [{ path: 'mapping.when', message: '' }] },
    );
  }
  const used: [string, string | null | undefined][] = [
    ['subject', mapping.subject],
    ['value', mapping.value],
    ['when', row.per === 'visit' ? mapping.when?.column : null],
    ['replicate', mapping.replicate],
    ['site', mapping.site],
  ];
  const facts = Object.entries(mapping.newSubjects ?? {}).flatMap(([name, source]) =>
    typeof source === 'object' && source.from === 'column'
      ? [[`newSubjects.${name}`, source.column] as [string, string]]
      : [],
  );
  const names = new Set(row.columns.map((column) => column.name));
  for (const [path, column] of [...used, ...facts]) {
    if (column && !names.has(column)) {
      throw new Problem(
        'import_column_unknown',
        { column },
        { errors: [{ path: `mapping.${path}`, message: '' }] },
      );
    }
  }
  const seen = new Set<string>();
  for (const [path, column] of used) {
    if (!column) continue;
    if (seen.has(column)) {
      throw new Problem(
        'import_column_twice',
        { column },
        { errors: [{ path: `mapping.${path}`, message: '' }] },
      );
    }
    seen.add(column);
  }
}
