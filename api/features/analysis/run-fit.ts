/** Running a fit: refused before the check, locked where readings repeat, always leaving a record. */
import { STAMP } from '../../../core/words/advice.ts';
import { AnalysisRecord } from '../../../database/entities/index.ts';
import type { Answer, FitAnswer } from '../../analysis-threads/jobs.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { RunFitRequest } from '../../contracts/analysis.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyScope } from '../cuts/scope.ts';
import {
  findAcknowledgement,
  findOpening,
  findSpecification,
  type StoredAcknowledgement,
  type StoredSpecification,
} from './analysis-repository.ts';
import { engineProblem } from './engine-problem.ts';
import { headlineOf } from './headline.ts';
import { pictureFor } from './picture-for.ts';
import { jobOf, type Question, questionOf, SEED } from './question.ts';
import { contentSha256 } from './record-content.ts';
import { acknowledgementView } from './views.ts';

/**
 * Runs a fit and returns the opaque id of its record.
 *
 * @throws Problem not_found, analysis_…, check_not_opened, ordinary_fit_locked, engine_…; nothing is written then
 */
export async function runFit(
  scope: StudyScope,
  cutUid: string,
  body: RunFitRequest,
): Promise<string> {
  const question = await questionOf(scope, cutUid, body.specification);
  const { specification, acknowledgement } = await pass(scope, question, body.fit);
  const fit = await scope.threads.fit({
    ...(await jobOf(scope, question)),
    fit: body.fit,
    acknowledge: acknowledgement?.reason ?? null,
  });
  if (!fit.ok) {
    throw engineProblem(fit);
  }
  return writeRecord(scope, question, body, specification, acknowledgement, fit);
}

/** The two gates, in the order in which a person meets them. */
async function pass(
  scope: StudyScope,
  { cut, input }: Question,
  fit: RunFitRequest['fit'],
): Promise<{
  specification: StoredSpecification;
  acknowledgement: StoredAcknowledgement | null;
}> {
  const { manager } = scope.db;
  const { accountId } = scope.actor;
  const specification = await findSpecification(manager, cut, input);
  const opening = specification && (await findOpening(manager, specification.id, accountId));
  if (!specification || !opening) {
    throw new Problem('check_not_opened');
  }
  if (fit === 'pooled' || !opening.repeats) {
    return { specification, acknowledgement: null };
  }
  const acknowledgement = await findAcknowledgement(manager, specification.id, accountId);
  if (acknowledgement === null) {
    throw new Problem('ordinary_fit_locked');
  }
  return { specification, acknowledgement };
}

async function writeRecord(
  scope: StudyScope,
  { cut }: Question,
  body: RunFitRequest,
  specification: StoredSpecification,
  acknowledgement: StoredAcknowledgement | null,
  fit: Extract<Answer<FitAnswer>, { ok: true }>,
): Promise<string> {
  const now = scope.clock();
  const stamp = body.fit === 'ordinary' && fit.repeats ? STAMP : null;
  const picture = await pictureFor(scope, cut, body.specification.unit, fit.picture);
  const sha256 = contentSha256({
    cut,
    specification,
    fit: body.fit,
    purpose: body.purpose,
    acknowledgement: acknowledgement && acknowledgementView(acknowledgement),
    checkText: fit.checkText,
    resultText: fit.text,
    engine: fit.engine,
    seed: SEED,
    createdBy: scope.actor.accountUid,
    createdAt: now.toISOString(),
  });
  return inTransaction(scope.db, scope.actor, async (tx) => {
    const repository = tx.manager.getRepository(AnalysisRecord);
    const record = await repository.save(
      repository.create({
        studyId: scope.studyId,
        cutId: cut.id,
        specificationId: specification.id,
        fit: body.fit,
        purpose: body.purpose,
        acknowledgementId: acknowledgement?.id ?? null,
        checkText: fit.checkText,
        resultText: fit.text,
        pictureText: JSON.stringify(picture),
        headline: headlineOf(fit.result, body.fit),
        stamp,
        contentSha256: sha256,
        engineVersion: fit.engine,
        seed: String(SEED),
        createdBy: scope.actor.accountId,
        createdAt: now,
      }),
    );
    tx.audit({
      at: now,
      studyUid: scope.studyUid,
      action: 'fit run',
      entity: 'analysis_record',
      entityUid: record.uid,
      after: {
        cut: cut.uid,
        specification: specification.sha256,
        number: specification.number,
        fit: body.fit,
        purpose: body.purpose,
        engine: fit.engine,
        contentSha256: sha256,
      },
      reason: acknowledgement?.reason ?? null,
    });
    return record.uid;
  });
}
