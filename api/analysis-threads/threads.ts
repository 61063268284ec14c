/** The server's side of the computing threads: the event loop only hands over bytes and takes answers. */
import { createRequire } from 'node:module';
import { pathToFileURL } from 'node:url';
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
  const source = import.meta.url.endsWith('.ts');
  const worker = new URL(source ? './worker.ts' : './worker.js', import.meta.url);
  const pool = new Piscina({
    filename: worker.href,
    minThreads: 0,
    maxThreads,
    idleTimeout: 60_000,
    execArgv: source ? ['--import', loaderOfTypeScript()] : [],
  });
  pool.on('error', onError);
  return {
    difference: (earlier, later) => pool.run({ earlier, later }, { name: 'difference' }),
    check: (job) => pool.run(job, { name: 'check' }),
    fit: (job) => pool.run(job, { name: 'fit' }),
    close: () => pool.destroy(),
  };
}

/** A thread does not inherit the loader of its parent where that was registered in code. */
function loaderOfTypeScript(): string {
  return pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;
}
