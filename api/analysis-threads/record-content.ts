/** What a record vouches for, in one spelling; its hash is what a signature is bound to. */
import type { fits, purposes, SpecificationInput } from '../contracts/analysis.ts';
import { canonicalSha256, type JsonValue } from './canonical-json.ts';

export interface RecordContent {
  cut: { uid: string; number: number; name: string; visitCutoff: string; sha256: string };
  specification: SpecificationInput & { sha256: string; number: number };
  fit: (typeof fits)[number];
  purpose: (typeof purposes)[number];
  acknowledgement: { by: string; at: string; reason: string } | null;
  /** Canonical JSON texts, as stored. */
  checkText: string;
  resultText: string;
  engine: string;
  seed: number;
  createdBy: string;
  createdAt: string;
}

/** The content as the file shows it; `content_sha256` is the hash of its canonical JSON. */
export function contentOf(record: RecordContent): JsonValue {
  return {
    acknowledgement: record.acknowledgement,
    check: JSON.parse(record.checkText),
    created_at: record.createdAt,
    created_by: record.createdBy,
    cut: {
      id: record.cut.uid,
      name: record.cut.name,
      number: record.cut.number,
      sha256: record.cut.sha256,
      visit_cutoff: record.cut.visitCutoff,
    },
    engine: record.engine,
    fit: record.fit,
    purpose: record.purpose,
    result: JSON.parse(record.resultText),
    seed: record.seed,
    specification: {
      axis: record.specification.axis,
      group: record.specification.group,
      measure: record.specification.measure,
      number: record.specification.number,
      sha256: record.specification.sha256,
      unit: record.specification.unit,
    },
  };
}

export function contentSha256(record: RecordContent): string {
  return canonicalSha256(contentOf(record));
}
