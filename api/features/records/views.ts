/** Stored records to the shapes of the contracts and of the file. */
import { canonicalJson, type JsonValue } from '../../analysis-threads/canonical-json.ts';
import {
  contentOf,
  contentSha256,
  type RecordContent,
} from '../../analysis-threads/record-content.ts';
import type { RecordSummary } from '../../contracts/analysis.ts';

import type { RecordRow, StoredRecord, StoredSignature } from './record-repository.ts';

export function summaryView(row: RecordRow): RecordSummary {
  const measure = row.cutMeasures.find((one) => one.shortName === row.measure);
  if (measure === undefined) {
    throw new Error(`record ${row.uid} names a measure that its cut does not hold`);
  }
  return {
    id: row.uid,
    cut: {
      id: row.cutUid,
      number: row.cutNumber,
      name: row.cutName,
      visitCutoff: row.visitCutoff,
    },
    measure,
    specification: specificationOf(row),
    fit: row.fit,
    purpose: row.purpose,
    by: row.createdBy,
    at: row.createdAt.toISOString(),
    engine: row.engine,
    seed: row.seed,
    contentSha256: row.contentSha256,
    stamp: row.stamp,
    headline: row.headline,
    signed: row.signed,
  };
}

function specificationOf(row: RecordRow): RecordContent['specification'] {
  return {
    measure: row.measure,
    axis: row.axis,
    unit: row.unit,
    group: row.group,
    sha256: row.specificationSha256,
    number: row.specificationNumber,
  };
}

export function acknowledgementOf(record: StoredRecord): RecordContent['acknowledgement'] {
  return record.acknowledgedAt === null
    ? null
    : {
        by: record.acknowledgedBy ?? '',
        at: record.acknowledgedAt.toISOString(),
        reason: record.acknowledgedReason ?? '',
      };
}

function recordContent(record: StoredRecord): RecordContent {
  return {
    cut: {
      uid: record.cutUid,
      number: record.cutNumber,
      name: record.cutName,
      visitCutoff: record.visitCutoff,
      sha256: record.cutSha256,
    },
    specification: specificationOf(record),
    fit: record.fit,
    purpose: record.purpose,
    acknowledgement: acknowledgementOf(record),
    checkText: record.checkText,
    resultText: record.resultText,
    engine: record.engine,
    seed: record.seed,
    createdBy: record.createdByUid,
    createdAt: record.createdAt.toISOString(),
  };
}

/** Taken anew from what is stored now: this is what tells a changed record from a signed one. */
export function currentSha256(record: StoredRecord): string {
  return contentSha256(recordContent(record));
}

export function signatureView(signature: StoredSignature, sha256: string) {
  return {
    name: signature.name,
    at: signature.at.toISOString(),
    zone: signature.zone,
    meaning: signature.meaning,
    contentSha256: signature.contentSha256,
    valid: signature.contentSha256 === sha256,
  };
}

/**
 * The record as a file. `content_sha256` is the SHA-256 of the canonical JSON of `content`, so anyone
 * can take it again; `stamp` stands where readings that repeat were taken as independent.
 */
export function recordFile(record: StoredRecord, signatures: readonly StoredSignature[]): string {
  const sha256 = currentSha256(record);
  const file: JsonValue = {
    format: 'tetherline-record/1',
    stamp: record.stamp ?? undefined,
    content_sha256: sha256,
    content: contentOf(recordContent(record)),
    signatures: signatures.map((signature) => {
      const { contentSha256: signed, ...view } = signatureView(signature, sha256);
      return { ...view, content_sha256: signed };
    }),
  };
  return `${canonicalJson(file)}\n`;
}
