/** Why the ordinary fit of repeated readings is wanted; opens it for this person and specification only. */
import type { z } from 'zod';
import { Acknowledgement } from '../../../database/entities/index.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { acknowledgementSchema, SpecificationInput } from '../../contracts/analysis.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyScope } from '../cuts/scope.ts';
import { findOpening, findSpecification } from './analysis-repository.ts';
import { questionOf } from './question.ts';

/**
 * Asks for the opened check first: a reason given before reading what the fit does would be none.
 *
 * @throws Problem not_found, analysis_…, check_not_opened
 */
export async function acknowledge(
  scope: StudyScope,
  cutUid: string,
  input: SpecificationInput,
  reason: string,
): Promise<z.infer<typeof acknowledgementSchema>> {
  const { cut } = await questionOf(scope, cutUid, input);
  const now = scope.clock();
  await inTransaction(scope.db, scope.actor, async (tx) => {
    const specification = await findSpecification(tx.manager, cut, input);
    const opening =
      specification && (await findOpening(tx.manager, specification.id, scope.actor.accountId));
    if (!specification || !opening) {
      throw new Problem('check_not_opened');
    }
    const repository = tx.manager.getRepository(Acknowledgement);
    const saved = await repository.save(
      repository.create({
        specificationId: specification.id,
        accountId: scope.actor.accountId,
        reason,
        at: now,
      }),
    );
    tx.audit({
      at: now,
      studyUid: scope.studyUid,
      action: 'ordinary fit acknowledged',
      entity: 'acknowledgement',
      entityUid: saved.uid,
      after: { cut: cut.uid, specification: specification.sha256 },
      reason,
    });
  });
  return { by: scope.actor.name, at: now.toISOString(), reason };
}
