/** Reading analysis records. */
import type { z } from 'zod';
import { inTransaction } from '../../audit/transaction.ts';
import type {
  recordDetailSchema,
  recordListQuerySchema,
  recordListSchema,
} from '../../contracts/analysis.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyScope } from '../cuts/scope.ts';
import { findRecord, listRecords, type StoredRecord, signaturesOf } from './record-repository.ts';
import { meaningsLeft } from './sign-record.ts';
import {
  acknowledgementOf,
  currentSha256,
  recordFile,
  signatureView,
  summaryView,
} from './views.ts';

/** @throws Problem not_found */
export async function recordOf(scope: StudyScope, recordUid: string): Promise<StoredRecord> {
  const record = await findRecord(scope.db.manager, scope.studyId, recordUid);
  if (record === null) {
    throw new Problem('not_found');
  }
  return record;
}

export async function recordPage(
  scope: StudyScope,
  query: z.infer<typeof recordListQuerySchema>,
): Promise<z.infer<typeof recordListSchema>> {
  const { rows, total } = await listRecords(scope.db.manager, scope.studyId, query);
  return { rows: rows.map(summaryView), total };
}

export async function recordDetail(
  scope: StudyScope,
  recordUid: string,
): Promise<z.input<typeof recordDetailSchema>> {
  const record = await recordOf(scope, recordUid);
  const signatures = await signaturesOf(scope.db.manager, record.uid);
  const sha256 = currentSha256(record);
  const check = JSON.parse(record.checkText) as Pick<z.input<typeof recordDetailSchema>, 'counts'>;
  return {
    ...summaryView(record),
    counts: check.counts,
    cutSha256: record.cutSha256,
    acknowledgement: acknowledgementOf(record),
    result: JSON.parse(record.resultText),
    picture: JSON.parse(record.pictureText ?? EMPTY_PICTURE),
    signatures: signatures.map((signature) => signatureView(signature, sha256)),
    mayBeSignedByMe:
      scope.actor.role === 'analyst' && meaningsLeft(record, signatures, scope.actor).length > 0,
  };
}

const EMPTY_PICTURE = '{"subjects":[],"visits":[],"band":[]}';

/** The record as a file; that it left the house is in the trail before its first byte. */
export async function fileOf(
  scope: StudyScope,
  recordUid: string,
): Promise<{ name: string; text: string }> {
  const record = await recordOf(scope, recordUid);
  const signatures = await signaturesOf(scope.db.manager, record.uid);
  await inTransaction(scope.db, scope.actor, async (tx) =>
    tx.audit({
      at: scope.clock(),
      studyUid: scope.studyUid,
      action: 'record downloaded',
      entity: 'analysis_record',
      entityUid: record.uid,
      after: { contentSha256: record.contentSha256 },
    }),
  );
  const name = `record-cut-${record.cutNumber}-${record.measure}-${record.specificationNumber}.json`;
  return { name, text: recordFile(record, signatures) };
}
