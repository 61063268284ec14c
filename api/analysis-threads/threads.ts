/** The server's side of the computing threads: the event loop only hands over bytes and takes answers. */
import { Piscina } from 'piscina';
import type { CutDifferenceCounts } from './difference.ts';
import type { Answer, CheckAnswer, CutJob, FitAnswer, FitJob } from './jobs.ts';

export interface AnalysisThreads {
  difference(earlier: Uint8Array, later: Uint8Array): Promise<CutDifferenceCounts>;
  check(job: CutJob): Promise<Answer<CheckAnswer>>;
  fit(job: FitJob): Promise<Answer<FitAnswer>>;
  close(): Promise<void>;
}

/**
 * Starts no thread before the first job and lets idle ones go after a minute.
 *
 * @param onError told of what happens outside a job, such as a thread that cannot load its module
 */
export function createAnalysisThreads(
  maxThreads: number,
  onError: (error: Error) => void,
): AnalysisThreads {
  const pool = new Piscina({
    filename: new URL('./worker-entry.mjs', import.meta.url).href,
    minThreads: 0,
    maxThreads,
    idleTimeout: 60_000,
  });
  pool.on('error', onError);
  return {
    difference: (earlier, later) => pool.run({ earlier, later }, { name: 'difference' }),
    check: (job) => pool.run(job, { name: 'check' }),
    fit: (job) => pool.run(job, { name: 'fit' }),
    close: () => pool.destroy(),
  };
}
