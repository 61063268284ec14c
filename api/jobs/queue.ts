/** The queue in PostgreSQL: any number of servers fill it, any number of workers empty it. */
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { DataSource, EntityManager } from 'typeorm';
import { Job } from '../../database/entities/index.ts';
import type { Clock } from '../clock.ts';
import { Problem } from '../http/problems.ts';
import { JobChanges } from './changes.ts';
import type { JobDefinition, JobOrder, Jobs } from './jobs.ts';
import { cancelAsked, noteEnd, noteProgress, noteStart } from './progress.ts';
import { QUEUE_SCHEMA, UPKEEP_QUEUE, WORK_QUEUE } from './queues.ts';

export interface QueueSettings {
  /** Address of the masked database role. */
  url: string;
  db: DataSource;
  clock: Clock;
  logger: Logger;
}

export interface Queue extends Jobs {
  /** Begins to take work. Without it this process only fills the queue. */
  work(definitions: readonly JobDefinition[], upkeep: () => Promise<void>): Promise<void>;
  /** Lets running work end, at most half a minute, then closes. */
  close(): Promise<void>;
}

/** Pieces of work that one process does side by side. */
const SIDE_BY_SIDE = 2;
const POLL_SECONDS = 0.5;
/** Work that has said nothing for so long has lost its machine. */
const EXPIRE_MINUTES = 60;
const UPKEEP_SECONDS = 3_600;
/** Tries after the first, for work that failed or lost its machine. */
const RETRIES = 2;
const PROGRESS_EVERY_MS = 250;

/** @param settings the tables have to stand already; see `createQueues` */
export async function openQueue(settings: QueueSettings): Promise<Queue> {
  const { url, clock, logger } = settings;
  const boss = new PgBoss({
    connectionString: url,
    schema: QUEUE_SCHEMA,
    max: 4,
    application_name: 'tetherline queue',
    migrate: false,
    schedule: false,
    supervise: true,
  });
  boss.on('error', (error) => {
    logger.error({ code: (error as { code?: string }).code }, 'the queue met a fault');
  });
  await boss.start();
  const changes = new JobChanges(url, logger);
  let hourly: NodeJS.Timeout | undefined;
  return {
    changes,
    start: (manager, order) => startJob(boss, manager, order, clock),
    async work(definitions, upkeep) {
      const byKind = new Map(definitions.map((definition) => [definition.kind, definition]));
      for (let nth = 0; nth < SIDE_BY_SIDE; nth += 1) {
        await boss.work<{ jobUid: string }>(
          WORK_QUEUE,
          { pollingIntervalSeconds: POLL_SECONDS, includeMetadata: true },
          async (taken) => {
            for (const job of taken) {
              const last = job.retryCount >= job.retryLimit;
              await runJob(settings, byKind, job.data.jobUid, last);
            }
          },
        );
      }
      await boss.work(UPKEEP_QUEUE, { pollingIntervalSeconds: 10 }, () => upkeep());
      // Asked by every process, taken once an hour by one of them.
      const ask = () =>
        boss
          .sendThrottled(UPKEEP_QUEUE, {}, {}, UPKEEP_SECONDS, 'hourly')
          .catch((error: Error) => logger.error({ kind: error.name }, 'upkeep was not asked for'));
      await ask();
      hourly = setInterval(ask, (UPKEEP_SECONDS * 1_000) / 6);
      hourly.unref();
    },
    async close() {
      clearInterval(hourly);
      await boss.stop({ graceful: true, wait: true, timeout: 30_000 });
      await changes.close();
    },
  };
}

/** The row of progress and the entry of the queue commit together or not at all. */
async function startJob(
  boss: PgBoss,
  manager: EntityManager,
  order: JobOrder,
  clock: Clock,
): Promise<string> {
  const job = await manager.save(Job, { ...order, createdAt: clock() });
  await boss.send(
    WORK_QUEUE,
    { jobUid: job.uid },
    {
      retryLimit: RETRIES,
      retryDelay: 2,
      expireInMinutes: EXPIRE_MINUTES,
      db: { executeSql: async (text, values) => ({ rows: await manager.query(text, values) }) },
    },
  );
  return job.uid;
}

async function runJob(
  settings: QueueSettings,
  byKind: ReadonlyMap<string, JobDefinition>,
  jobUid: string,
  last: boolean,
): Promise<void> {
  const { db, clock, logger } = settings;
  const job = await noteStart(db, jobUid, clock);
  if (!job) return;
  const definition = byKind.get(job.kind);
  let stopped = false;
  let toldAt = 0;
  try {
    if (!definition) throw new Error(`nobody knows work of the kind ${job.kind}`);
    await definition.handler({
      jobUid,
      subjectUid: job.subjectUid,
      studyId: job.studyId,
      accountId: job.accountId,
      progress: async (done, total) => {
        if (Date.now() - toldAt < PROGRESS_EVERY_MS && done !== total) return;
        toldAt = Date.now();
        await noteProgress(db, jobUid, done, total);
      },
      cancelled: async () => {
        stopped ||= await cancelAsked(db, jobUid);
        return stopped;
      },
    });
    await noteEnd(db, jobUid, { state: stopped ? 'cancelled' : 'done' }, clock);
  } catch (error) {
    const refused = error instanceof Problem && error.status < 500 ? error : undefined;
    // A refusal stays one however often it is tried.
    if (refused || last) {
      const { code, params } = refused ?? { code: 'failed', params: { requestId: jobUid } };
      await noteEnd(
        db,
        jobUid,
        { state: 'failed', problem: { code, params: { ...params } } },
        clock,
      );
    } else await noteEnd(db, jobUid, { state: 'waiting' }, clock);
    logger[refused ? 'info' : 'error'](
      { jobUid, kind: job.kind, fault: error instanceof Error ? error.name : typeof error },
      'work did not end well',
    );
    if (!refused) throw error;
  }
}
