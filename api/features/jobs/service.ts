/** Jobs belong to the person who started them; to everybody else they do not exist. */
import { Job, Study } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { JobView } from '../../contracts/jobs.ts';
import type { AppDeps } from '../../http/deps.ts';
import { Problem } from '../../http/problems.ts';
import type { SignedInPerson } from '../../http/request-facts.ts';
import { askToCancel, jobView } from '../../jobs/progress.ts';

/** @throws Problem `not_found` */
export async function ownJob(
  deps: AppDeps,
  person: SignedInPerson,
  jobUid: string,
): Promise<JobView> {
  return jobView(await find(deps, person, jobUid));
}

/** @throws Problem `not_found` or `job_finished` */
export async function cancelJob(
  deps: AppDeps,
  person: SignedInPerson,
  actor: Actor,
  jobUid: string,
): Promise<JobView> {
  const db = deps.databases.masked;
  const job = await find(deps, person, jobUid);
  if (job.state !== 'waiting' && job.state !== 'running') throw new Problem('job_finished');
  const study = job.studyId
    ? await db.getRepository(Study).findOneByOrFail({ id: job.studyId })
    : null;
  await inTransaction(db, actor, async (tx) => {
    await askToCancel(tx.manager, jobUid);
    tx.audit({
      at: deps.clock(),
      studyUid: study?.uid ?? null,
      action: 'job cancel asked',
      entity: 'job',
      entityUid: job.uid,
      after: { kind: job.kind, subject: job.subjectUid },
    });
  });
  return ownJob(deps, person, jobUid);
}

async function find(deps: AppDeps, person: SignedInPerson, jobUid: string): Promise<Job> {
  const job = await deps.databases.masked
    .getRepository(Job)
    .findOneBy({ uid: jobUid, accountId: person.accountId });
  if (!job) throw new Problem('not_found');
  return job;
}
