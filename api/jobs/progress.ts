/** The table that says how far each job has come, and the call that tells every server of a change. */
import { type DataSource, type EntityManager, In } from 'typeorm';
import { Job, type JobState } from '../../database/entities/index.ts';
import type { Clock } from '../clock.ts';
import type { JobView } from '../contracts/jobs.ts';

export const JOB_CHANNEL = 'tether_job';

export function jobView(job: Job): JobView {
  return {
    id: job.uid,
    kind: job.kind,
    state: job.state,
    done: job.done,
    total: job.total,
    subject: job.subjectUid,
    cancelRequested: job.cancelRequested,
    problem: job.problem as JobView['problem'],
    createdAt: job.createdAt.toISOString(),
    finishedAt: job.finishedAt?.toISOString() ?? null,
  };
}

async function tell(manager: EntityManager, jobUid: string): Promise<void> {
  await manager.query('SELECT pg_notify($1, $2)', [JOB_CHANNEL, jobUid]);
}

export async function noteProgress(
  db: DataSource,
  jobUid: string,
  done: number,
  total: number | null,
): Promise<void> {
  await db.manager.update(Job, { uid: jobUid, state: 'running' }, { done, total });
  await tell(db.manager, jobUid);
}

/** @returns the job, or null where it ended before */
export async function noteStart(db: DataSource, jobUid: string, clock: Clock): Promise<Job | null> {
  const open: JobState[] = ['waiting', 'running'];
  await db.manager.update(
    Job,
    { uid: jobUid, state: In(open) },
    { state: 'running', startedAt: clock() },
  );
  await tell(db.manager, jobUid);
  return db.manager.findOneBy(Job, { uid: jobUid, state: 'running' });
}

export async function noteEnd(
  db: DataSource,
  jobUid: string,
  end: { state: JobState; problem?: { code: string; params: Record<string, string | number> } },
  clock: Clock,
): Promise<void> {
  await db.manager.query(
    'UPDATE job SET state = $2, problem = $3, finished_at = $4 WHERE uid = $1',
    [
      jobUid,
      end.state,
      end.problem ? JSON.stringify(end.problem) : null,
      end.state === 'waiting' ? null : clock(),
    ],
  );
  await tell(db.manager, jobUid);
}

export async function askToCancel(manager: EntityManager, jobUid: string): Promise<void> {
  await manager.update(Job, { uid: jobUid }, { cancelRequested: true });
  await tell(manager, jobUid);
}

export async function cancelAsked(db: DataSource, jobUid: string): Promise<boolean> {
  return db.manager.existsBy(Job, { uid: jobUid, cancelRequested: true });
}
