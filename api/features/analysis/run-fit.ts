/** Running a fit: refused before the check, locked where readings repeat, always leaving a record. */
import { STAMP } from '../../../core/words/advice.ts';
import { AnalysisRecord } from '../../../database/entities/index.ts';
import type { Answer, FitAnswer, RecordFrame } from '../../analysis-threads/jobs.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { RunFitRequest } from '../../contracts/analysis.ts';
import { Problem } from '../../http/problems.ts';
import type { StoredCut } from '../cuts/cut-repository.ts';
import type { StudyScope } from '../cuts/scope.ts';
import {
  findAcknowledgement,
  findOpening,
  findSpecification,
  type StoredAcknowledgement,
  type StoredSpecification,
} from './analysis-repository.ts';
import { engineProblem } from './engine-problem.ts';
import { jobOf, type Question, questionOf, SEED, subjectIds } from './question.ts';
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
  const { cut } = question;
  const now = scope.clock();
  const { uid, number, name, visitCutoff, sha256 } = cut;
  const record: RecordFrame = {
    cut: { uid, number, name, visitCutoff, sha256 },
    specification,
    fit: body.fit,
    purpose: body.purpose,
    acknowledgement: acknowledgement && acknowledgementView(acknowledgement),
    seed: SEED,
    createdBy: scope.actor.accountUid,
    createdAt: now.toISOString(),
  };
  const fit = await scope.threads.fit({
    ...(await jobOf(scope, question)),
    record,
    ids: await subjectIds(scope),
    ended: cut.ended,
  });
  if (!fit.ok) {
    throw engineProblem(fit);
  }
  return writeRecord(scope, { cut, specification, acknowledgement, record, fit, now });
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

interface FinishedFit {
  cut: StoredCut;
  specification: StoredSpecification;
  acknowledgement: StoredAcknowledgement | null;
  record: RecordFrame;
  fit: Extract<Answer<FitAnswer>, { ok: true }>;
  now: Date;
}

async function writeRecord(scope: StudyScope, finished: FinishedFit): Promise<string> {
  const { cut, specification, acknowledgement, fit, now } = finished;
  const { fit: kind, purpose } = finished.record;
  return inTransaction(scope.db, scope.actor, async (tx) => {
    const repository = tx.manager.getRepository(AnalysisRecord);
    const record = await repository.save(
      repository.create({
        studyId: scope.studyId,
        cutId: cut.id,
        specificationId: specification.id,
        fit: kind,
        purpose,
        acknowledgementId: acknowledgement?.id ?? null,
        checkText: fit.checkText,
        resultText: fit.resultText,
        pictureText: fit.pictureText,
        headline: fit.headline,
        stamp: kind === 'ordinary' && fit.repeats ? STAMP : null,
        contentSha256: fit.contentSha256,
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
        fit: kind,
        purpose,
        engine: fit.engine,
        contentSha256: fit.contentSha256,
      },
      reason: acknowledgement?.reason ?? null,
    });
    return record.uid;
  });
}
