/** Puts a cut together from the snapshot: its bytes, their hash, and what the cut says of itself. */
import type { EntityManager } from 'typeorm';
import type { CutExclusion } from '../../contracts/cuts.ts';
import { endOfFollowUp } from '../subjects/state-steps.ts';
import { CanonicalCsvWriter } from './canonical-csv.ts';
import { rowsOfSubject } from './cut-rows.ts';
import type { CutPlan, LateReading, PendingVisit, SubjectOfCut } from './cut-shapes.ts';
import { daysBetween } from './days.ts';
import { forEachSubject } from './read-snapshot.ts';

export interface CutRequest extends CutPlan {
  studyId: string;
  measureIds: readonly string[];
  /** Whether groups are open to the readers of the cut. */
  withGroup: boolean;
  exclusions: readonly CutExclusion[];
  includeWithdrawn: boolean;
}

/** A subject whose follow-up had ended by the visit cutoff. */
export interface EndedSubject {
  code: string;
  word: string;
  /** Days since baseline. */
  day: number | null;
}

export interface AssembledCut {
  chunks: Buffer[];
  sha256: string;
  rows: number;
  subjects: number;
  readings: number;
  late: LateReading[];
  pending: PendingVisit[];
  withdrawnLeftOut: { subjects: number; readings: number };
  /** What would be left out if nobody asked for it; told before freezing. */
  withdrawn: { subjects: number; readings: number };
  ended: EndedSubject[];
  groups: string[];
  /** Codes met in the study: an exclusion of any other is a mistake. */
  knownCodes: Set<string>;
}

const CONSENT_WITHDRAWN = 'consent withdrawn';

/**
 * Reads the study once and writes the canonical CSV. The bytes stay in memory (about 50 of them a
 * reading) until the cut they belong to is written, since a cut can never be changed afterwards.
 */
export async function assembleCut(
  manager: EntityManager,
  request: CutRequest,
): Promise<AssembledCut> {
  const writer = new CanonicalCsvWriter(
    request.measures.map((measure) => measure.shortName),
    request.withGroup,
  );
  const exclusions = bySubject(request.exclusions);
  const cut: Omit<AssembledCut, 'chunks' | 'sha256' | 'rows'> = {
    subjects: 0,
    readings: 0,
    late: [],
    pending: [],
    withdrawnLeftOut: { subjects: 0, readings: 0 },
    withdrawn: { subjects: 0, readings: 0 },
    ended: [],
    groups: [],
    knownCodes: new Set(),
  };
  const groups = new Set<string>();

  await forEachSubject(
    manager,
    request.studyId,
    request.measureIds,
    request.withGroup,
    (subject) => {
      cut.knownCodes.add(subject.code);
      const own = exclusions.get(subject.code) ?? [];
      if (own.some((exclusion) => exclusion.measure === null && exclusion.visit === null)) {
        return;
      }
      const part = rowsOfSubject(subject, request, own);
      if (part.rows.length === 0) {
        return;
      }
      if (subject.state === CONSENT_WITHDRAWN) {
        cut.withdrawn.subjects += 1;
        cut.withdrawn.readings += part.readings;
        if (!request.includeWithdrawn) {
          cut.withdrawnLeftOut.subjects += 1;
          cut.withdrawnLeftOut.readings += part.readings;
          return;
        }
      }
      for (const row of part.rows) {
        writer.write(row);
      }
      cut.subjects += 1;
      cut.readings += part.readings;
      cut.late.push(...part.late);
      cut.pending.push(...part.pending);
      if (subject.group !== null) {
        groups.add(subject.group);
      }
      const ended = endOf(subject, request.visitCutoff);
      if (ended !== null) {
        cut.ended.push(ended);
      }
    },
  );
  cut.groups = [...groups].sort((a, b) => (a < b ? -1 : 1));
  return { ...cut, ...writer.finish() };
}

function bySubject(exclusions: readonly CutExclusion[]): Map<string, CutExclusion[]> {
  const lists = new Map<string, CutExclusion[]>();
  for (const exclusion of exclusions) {
    const list = lists.get(exclusion.subjectCode) ?? [];
    list.push(exclusion);
    lists.set(exclusion.subjectCode, list);
  }
  return lists;
}

/** Who completed did not end early, so is no dropout. */
function endOf(subject: SubjectOfCut, cutoff: string): EndedSubject | null {
  const end = endOfFollowUp(subject.state, subject.stateDate);
  if (end === null || end > cutoff || subject.state === 'completed') {
    return null;
  }
  const day = subject.baselineDate === null ? null : daysBetween(subject.baselineDate, end);
  return { code: subject.code, word: subject.state, day };
}
