/** Every kind of long work that a worker can do. */
import type { AppDeps } from '../http/deps.ts';
import type { JobDefinition } from '../jobs/jobs.ts';
import { importJobs } from './imports/work.ts';

export function jobDefinitions(
  deps: Pick<AppDeps, 'databases' | 'store' | 'clock' | 'importThreads'>,
): readonly JobDefinition[] {
  return importJobs(deps);
}
