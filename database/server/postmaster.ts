import { existsSync, readFileSync, readlinkSync } from 'node:fs';
import { join } from 'node:path';
import { isAlive } from './start-lock.ts';

/** What PostgreSQL itself writes about a running server: one line a fact, the last one its state. */
export interface Postmaster {
  pid: number;
  port: number;
  ready: boolean;
}

/** The server of a data folder, if its pid file names one; a file left by a crash is told apart by `alive`. */
export function readPostmaster(cluster: string): (Postmaster & { alive: boolean }) | undefined {
  const file = pidFile(cluster);
  if (!existsSync(file)) return undefined;
  const lines = readFileSync(file, 'utf8').split('\n');
  const pid = Number.parseInt(lines[0] ?? '', 10);
  const port = Number.parseInt(lines[3] ?? '', 10);
  if (!Number.isInteger(pid)) return undefined;
  return {
    pid,
    port: Number.isInteger(port) ? port : 0,
    ready: (lines[7] ?? '').trim() === 'ready',
    alive: isAlive(pid) && worksIn(pid, cluster),
  };
}

export function pidFile(cluster: string): string {
  return join(cluster, 'postmaster.pid');
}

/** A pid may have gone to another program since the crash: a PostgreSQL server always works in its data folder. */
function worksIn(pid: number, cluster: string): boolean {
  if (process.platform !== 'linux') return true;
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === cluster;
  } catch (error) {
    // Root may read every link; anybody else may not read another user's, whose server it can't be anyway.
    const code = (error as NodeJS.ErrnoException).code;
    if (code === 'ENOENT' || code === 'EACCES' || code === 'EPERM' || code === 'ESRCH')
      return false;
    throw error;
  }
}
