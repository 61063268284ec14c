/** What the application is given; nothing below reaches for a global. */
import type { Logger } from 'pino';
import type { Databases } from '../../database/data-source.ts';
import type { AnalysisThreads } from '../analysis-threads/threads.ts';
import type { Clock } from '../clock.ts';
import type { Config } from '../config.ts';
import type { ImportThreads } from '../import-threads/threads.ts';
import type { Jobs } from '../jobs/jobs.ts';
import type { Mailer } from '../mail/mailer.ts';
import type { Metrics } from '../metrics/metrics.ts';
import type { Secrets } from '../secrets.ts';
import type { ObjectStore } from '../storage/object-store.ts';

export interface AppDeps {
  databases: Databases;
  store: ObjectStore;
  mailer: Mailer;
  clock: Clock;
  config: Config;
  /** Signs access tokens; keys the fingerprints of network and e-mail addresses. */
  secrets: Pick<Secrets, 'jwtKey' | 'hashKey'>;
  jobs: Jobs;
  logger: Logger;
  threads: AnalysisThreads;
  importThreads: ImportThreads;
  metrics: Metrics;
  /** Folder of the built pages; without one only the API is served. */
  webRoot?: string;
}
