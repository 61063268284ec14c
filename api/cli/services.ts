import { availableParallelism } from 'node:os';
import type { Logger } from 'pino';
import { openDatabases } from '../../database/data-source.ts';
import { createAnalysisThreads } from '../analysis-threads/threads.ts';
import { type Clock, systemClock } from '../clock.ts';
import { jobDefinitions } from '../features/job-definitions.ts';
import type { AppDeps } from '../http/deps.ts';
import { createImportThreads } from '../import-threads/threads.ts';
import { openQueue } from '../jobs/queue.ts';
import { hourlyUpkeep } from '../jobs/upkeep.ts';
import { openMailer } from '../mail/mailer.ts';
import { createMetrics } from '../metrics/metrics.ts';
import { openStore } from '../storage/open-store.ts';
import type { Installation } from './installation.ts';

export interface Services {
  deps: AppDeps;
  /** Begins to take long work from the queue in this process. */
  work(): Promise<void>;
  close(): Promise<void>;
}

export interface ServiceOptions {
  logger: Logger;
  clock?: Clock;
  /** Mail server in place of the configured one: the demo's sink. */
  smtpUrl?: string;
  /** Connections of the masked role. */
  poolSize?: number;
}

/** Connects everything the application is given; what was opened is closed again when a later part fails. */
export async function openServices(
  installation: Pick<Installation, 'config' | 'secrets' | 'dataFolder' | 'urls'>,
  options: ServiceOptions,
): Promise<Services> {
  const { config, secrets, urls } = installation;
  const { logger, clock = systemClock } = options;
  const closers: (() => Promise<void> | void)[] = [];
  const close = async () => {
    for (const closeOne of closers.splice(0).reverse()) await closeOne();
  };
  try {
    const databases = await openDatabases({ urls, poolSize: options.poolSize });
    closers.push(databases.close);
    const storage = await openStore(config.storage, {
      dataFolder: installation.dataFolder,
      key: secrets.storageKey,
    });
    closers.push(storage.close);
    const mailer = openMailer(
      { smtpUrl: options.smtpUrl ?? config.mail.smtpUrl, from: config.mail.from },
      (kind, reason) => logger.warn({ kind, reason }, 'a letter could not be sent'),
    );
    closers.push(mailer.close);
    // One processor stays with the event loop.
    const threads = createAnalysisThreads(Math.max(1, availableParallelism() - 1), (error) =>
      logger.error({ kind: error.name }, 'a computing thread failed'),
    );
    closers.push(threads.close);
    const importThreads = createImportThreads(1, (error) =>
      logger.error({ kind: error.name }, 'a parsing thread failed'),
    );
    closers.push(importThreads.close);
    const queue = await openQueue({ url: urls.masked, db: databases.masked, clock, logger });
    closers.push(queue.close);
    const { store } = storage;
    const deps: AppDeps = {
      databases,
      store,
      mailer,
      clock,
      config,
      secrets,
      jobs: queue,
      logger,
      threads,
      importThreads,
      metrics: createMetrics(databases),
    };
    return {
      deps,
      work: () =>
        queue.work(jobDefinitions(deps), () => hourlyUpkeep(databases.masked, store, clock)),
      close,
    };
  } catch (error) {
    await close();
    throw error;
  }
}
