/** Freezing a cut: read once, hash, write, never change. */
import type { EntityManager } from 'typeorm';
import { Cut, CutChunk } from '../../../database/entities/index.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { FreezeCutRequest } from '../../contracts/cuts.ts';
import { Problem } from '../../http/problems.ts';
import { type AssembledCut, assembleCut } from './assemble-cut.ts';
import { columnOrder } from './canonical-csv.ts';
import {
  checkCutoff,
  checkedExclusions,
  chosenMeasures,
  refuseUnknownSubjects,
} from './check-request.ts';
import { bytesOfCut } from './cut-bytes.ts';
import { type CutMeasure, lastCut, type StoredDifference } from './cut-repository.ts';
import type { StudyScope } from './scope.ts';
import { readStudyPlan } from './study-plan.ts';

/**
 * Freezes a cut and returns its opaque id.
 *
 * @throws Problem with a code of `api/words/cuts.ts`; then nothing is written
 */
export async function freezeCut(scope: StudyScope, body: FreezeCutRequest): Promise<string> {
  return inTransaction(scope.db, scope.actor, async (tx) => {
    const { manager } = tx;
    // One cut of a study at a time: its number and what it is compared with depend on the one before.
    await manager.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 0))', [
      `cut ${scope.studyUid}`,
    ]);
    const now = scope.clock();
    const plan = await readStudyPlan(manager, scope.studyId, now);
    checkCutoff(body.visitCutoff, plan);
    const measures = chosenMeasures(body.measures, plan);
    const { exclusions, at } = checkedExclusions(body, plan);
    const assembled = await assembleCut(manager, {
      studyId: scope.studyId,
      visitCutoff: body.visitCutoff,
      lateDays: plan.lateDays,
      plannedVisits: plan.plannedVisits,
      measures,
      measureIds: measures.map((measure) => measure.id),
      withGroup: plan.groupsOpen,
      exclusions,
      includeWithdrawn: body.includeWithdrawnReason !== null,
    });
    refuseUnknownSubjects(at, assembled.knownCodes);
    if (assembled.rows === 0) {
      throw new Problem('cut_nothing_to_freeze', { day: body.visitCutoff });
    }
    const previous = await lastCut(manager, scope.studyId);
    const difference = previous ? await differenceTo(scope, manager, previous, assembled) : null;
    const repository = manager.getRepository(Cut);
    const cut = await repository.save(
      repository.create({
        studyId: scope.studyId,
        number: (previous?.number ?? 0) + 1,
        name: body.name,
        measures: inColumnOrder(measures),
        visitCutoff: body.visitCutoff,
        enteredUntil: now,
        frozenBy: scope.actor.accountId,
        frozenAt: now,
        exclusions,
        withdrawnIncludedReason: body.includeWithdrawnReason,
        withdrawnLeftOut: assembled.withdrawnLeftOut,
        rowCount: assembled.rows,
        subjectCount: assembled.subjects,
        readingCount: assembled.readings,
        lateCount: assembled.late.length,
        pendingCount: assembled.pending.length,
        lateRows: assembled.late,
        pendingRows: assembled.pending,
        ended: assembled.ended,
        groups: assembled.groups,
        sha256: assembled.sha256,
        previousCutId: previous?.id ?? null,
        difference,
      }),
    );
    for (const [seq, bytes] of assembled.chunks.entries()) {
      await manager.insert(CutChunk, { cutId: cut.id, seq, bytes });
    }
    tx.audit({
      at: now,
      studyUid: scope.studyUid,
      action: 'cut frozen',
      entity: 'cut',
      entityUid: cut.uid,
      after: {
        number: cut.number,
        name: cut.name,
        visitCutoff: cut.visitCutoff,
        measures: measures.map((measure) => measure.shortName),
        exclusions: exclusions.length,
        rows: assembled.rows,
        sha256: assembled.sha256,
      },
      reason: body.includeWithdrawnReason,
    });
    return cut.uid;
  });
}

async function differenceTo(
  scope: StudyScope,
  manager: EntityManager,
  previous: { id: string; uid: string; number: number; name: string },
  assembled: AssembledCut,
): Promise<StoredDifference> {
  const earlier = await bytesOfCut(manager, previous.id);
  const later = new Uint8Array(Buffer.concat(assembled.chunks));
  const counts = await scope.threads.difference(earlier, later);
  return {
    against: { id: previous.uid, number: previous.number, name: previous.name },
    ...counts,
  };
}

/** In the order of the columns of the file, without the inner key. */
function inColumnOrder(measures: readonly (CutMeasure & { id: string })[]): CutMeasure[] {
  const byName = new Map(measures.map(({ id: _id, ...measure }) => [measure.shortName, measure]));
  return columnOrder([...byName.keys()]).flatMap((name) => byName.get(name) ?? []);
}
