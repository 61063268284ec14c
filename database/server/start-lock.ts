import { linkSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { setTimeout as pause } from 'node:timers/promises';
import { ClusterProblem } from './cluster-problem.ts';

/**
 * Only one process at a time may make, start, migrate and seed a data folder. The lock is a file with the
 * holder's pid; one whose holder has died is taken over.
 * @returns a function that gives the lock back
 * @throws ClusterProblem `locked` when another start still holds it after the wait
 */
export async function takeStartLock(file: string, waitMs: number): Promise<() => void> {
  // Linking a file that already holds the pid makes the lock appear whole or not at all.
  const mine = `${file}.${process.pid}`;
  writeFileSync(mine, String(process.pid), { mode: 0o600 });
  const deadline = Date.now() + waitMs;
  try {
    while (!tryLink(mine, file)) {
      const holder = readHolder(file);
      // In a container the same small pid comes round again: a lock with our own pid is an old one.
      if (holder !== undefined && (holder === process.pid || !isAlive(holder))) {
        rmSync(file, { force: true });
        continue;
      }
      if (Date.now() > deadline) {
        throw new ClusterProblem('locked', { file, pid: String(holder ?? 'unknown') });
      }
      await pause(200);
    }
  } finally {
    rmSync(mine, { force: true });
  }
  return () => rmSync(file, { force: true });
}

function tryLink(from: string, to: string): boolean {
  try {
    linkSync(from, to);
    return true;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'EEXIST') return false;
    throw error;
  }
}

/** Undefined when the holder gave the lock back between our two looks at it. */
function readHolder(file: string): number | undefined {
  try {
    const pid = Number.parseInt(readFileSync(file, 'utf8'), 10);
    return Number.isInteger(pid) ? pid : undefined;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
    throw error;
  }
}

/** Whether a process exists; one of another user answers EPERM and exists too. */
export function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}
