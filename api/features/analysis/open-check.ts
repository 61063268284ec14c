/** Opening the independence check: computed from the frozen bytes, and remembered for this person. */
import type { z } from 'zod';
import { CheckOpening } from '../../../database/entities/index.ts';
import type { OwnResiduals } from '../../analysis-threads/jobs.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { checkSchema, SpecificationInput } from '../../contracts/analysis.ts';
import { toSummary } from '../cuts/cut-repository.ts';
import type { StudyScope } from '../cuts/scope.ts';
import { ensureSpecification, findAcknowledgement } from './analysis-repository.ts';
import { engineProblem } from './engine-problem.ts';
import { jobOf, questionOf, SEED, subjectIds } from './question.ts';
import { acknowledgementView, specificationView } from './views.ts';

/** The answer as it leaves: what the threads give is wider than the contract names. */
type CheckAnswerBody = z.input<typeof checkSchema>;

/**
 * @throws Problem not_found, analysis_…, engine_…; a check that can't be computed counts as not opened
 */
export async function openCheck(
  scope: StudyScope,
  cutUid: string,
  input: SpecificationInput,
): Promise<CheckAnswerBody> {
  const question = await questionOf(scope, cutUid, input);
  const { cut, measure } = question;
  const check = await scope.threads.check(await jobOf(scope, question));
  if (!check.ok) {
    throw engineProblem(check);
  }
  const now = scope.clock();
  const specification = await inTransaction(scope.db, scope.actor, async (tx) => {
    const stored = await ensureSpecification(tx.manager, cut, input, now);
    await tx.manager.insert(CheckOpening, {
      specificationId: stored.id,
      accountId: scope.actor.accountId,
      at: now,
      seed: String(SEED),
      result: check.text,
    });
    tx.audit({
      at: now,
      studyUid: scope.studyUid,
      action: 'check opened',
      entity: 'cut',
      entityUid: cut.uid,
      after: { specification: stored.sha256, number: stored.number, measure: stored.measure },
    });
    return stored;
  });
  const acknowledgement = await findAcknowledgement(
    scope.db.manager,
    specification.id,
    scope.actor.accountId,
  );
  const ids = await subjectIds(scope);
  const { structure, independence, advice } = JSON.parse(check.text) as Pick<
    CheckAnswerBody,
    'structure' | 'independence' | 'advice'
  >;
  return {
    specification: specificationView(specification),
    cut: toSummary(cut),
    measure,
    counts: check.counts,
    engine: check.engine,
    seed: SEED,
    structure,
    independence,
    consequences: check.consequences,
    observed: withIds(check.observed, ids),
    dealt: withIds(check.dealt, ids),
    advice,
    cautions: cautionsOf(measure.nature, check.counts),
    lock: {
      locked: check.repeats && acknowledgement === null,
      acknowledgement: acknowledgement && acknowledgementView(acknowledgement),
    },
  };
}

function withIds(residuals: readonly OwnResiduals[], ids: ReadonlyMap<string, string>) {
  return residuals.map((own) => ({ id: ids.get(own.code) ?? own.code, ...own }));
}

/** Codes; the pages have the sentences. */
function cautionsOf(nature: string, counts: { censored: number }): CheckAnswerBody['cautions'] {
  const cautions: CheckAnswerBody['cautions'] = [];
  if (nature === 'count') {
    cautions.push({ code: 'count' });
  }
  if (counts.censored > 0) {
    cautions.push({ code: 'censored' });
  }
  return cautions;
}
