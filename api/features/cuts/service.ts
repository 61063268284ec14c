/** Reading cuts: the list, one cut, what freezing would give, and the difference of two. */
import type { z } from 'zod';
import { inTransaction } from '../../audit/transaction.ts';
import type {
  CutDetail,
  CutPreview,
  cutChoicesSchema,
  cutDifferenceSchema,
  cutPreviewQuerySchema,
} from '../../contracts/cuts.ts';
import { Problem } from '../../http/problems.ts';
import { assembleCut } from './assemble-cut.ts';
import { checkCutoff, chosenMeasures } from './check-request.ts';
import { bytesOfCut } from './cut-bytes.ts';
import { findCut, type StoredCut, toSummary } from './cut-repository.ts';
import type { StudyScope } from './scope.ts';
import { readStudyPlan } from './study-plan.ts';

/** Late and pending rows are read by people; the whole of them stays with the cut. */
const ROWS_SHOWN = 1_000;

/** @throws Problem not_found, in the words used for anything unknown */
export async function cutOf(scope: StudyScope, cutUid: string): Promise<StoredCut> {
  const cut = await findCut(scope.db.manager, scope.studyId, cutUid);
  if (cut === null) {
    throw new Problem('not_found');
  }
  return cut;
}

export async function cutDetail(scope: StudyScope, cutUid: string): Promise<CutDetail> {
  const cut = await cutOf(scope, cutUid);
  return {
    ...toSummary(cut),
    exclusions: cut.exclusions,
    includeWithdrawnReason: cut.includeWithdrawnReason,
    withdrawnLeftOut: cut.withdrawnLeftOut,
    difference: cut.difference,
    lateRows: cut.lateRows.slice(0, ROWS_SHOWN),
    pendingRows: cut.pendingRows.slice(0, ROWS_SHOWN),
    groups: cut.groups,
  };
}

export async function cutChoices(scope: StudyScope): Promise<z.infer<typeof cutChoicesSchema>> {
  const plan = await readStudyPlan(scope.db.manager, scope.studyId, scope.clock());
  return {
    measures: plan.measures.map(({ id: _id, ...measure }) => measure),
    today: plan.today,
    masked: plan.masked,
    lateDays: plan.lateDays,
  };
}

/** What freezing now would give, without exclusions; the same code as freezing, so the same numbers. */
export async function previewCut(
  scope: StudyScope,
  query: z.infer<typeof cutPreviewQuerySchema>,
): Promise<CutPreview> {
  return scope.db.transaction(async (manager) => {
    const plan = await readStudyPlan(manager, scope.studyId, scope.clock());
    checkCutoff(query.visitCutoff, plan);
    const names = query.measures.split(',').map((name) => name.trim());
    const measures = chosenMeasures(names, plan);
    const cut = await assembleCut(manager, {
      studyId: scope.studyId,
      visitCutoff: query.visitCutoff,
      lateDays: plan.lateDays,
      plannedVisits: plan.plannedVisits,
      measures,
      measureIds: measures.map((measure) => measure.id),
      withGroup: plan.groupsOpen,
      exclusions: [],
      includeWithdrawn: false,
    });
    return {
      rows: cut.rows,
      subjects: cut.subjects,
      readings: cut.readings,
      late: cut.late.length,
      pending: cut.pending.length,
      withdrawnReadings: cut.withdrawn.readings,
      withdrawnSubjects: cut.withdrawn.subjects,
      lateDays: plan.lateDays,
    };
  });
}

export async function cutDifference(
  scope: StudyScope,
  cutUid: string,
  againstUid: string,
): Promise<z.infer<typeof cutDifferenceSchema>> {
  const cut = await cutOf(scope, cutUid);
  const against = await cutOf(scope, againstUid);
  const counts = await scope.threads.difference(
    await bytesOfCut(scope.db.manager, against.id),
    await bytesOfCut(scope.db.manager, cut.id),
  );
  return {
    against: { id: against.uid, number: against.number, name: against.name },
    ...counts,
  };
}

/** A download leaves its trace before the first byte leaves the house. */
export async function noteDownload(scope: StudyScope, cut: StoredCut): Promise<void> {
  await inTransaction(scope.db, scope.actor, async (tx) => {
    tx.audit({
      at: scope.clock(),
      studyUid: scope.studyUid,
      action: 'cut downloaded',
      entity: 'cut',
      entityUid: cut.uid,
      after: { number: cut.number, sha256: cut.sha256 },
    });
  });
}
