import { mkdirSync, writeFileSync } from 'node:fs';
import { ClusterProblem } from './cluster-problem.ts';
import { runCommand } from './run-command.ts';

/** The one line a person types where this process may not install packages itself. */
export function aptLine(packages: readonly string[]): string {
  return `sudo apt-get update && sudo apt-get install --yes ${packages.join(' ')}`;
}

/** True where system packages can be installed without asking anybody: root on a system with apt. */
export function canInstall(): boolean {
  return process.platform === 'linux' && process.getuid?.() === 0;
}

/** A fresh machine may still be busy with its own updates: apt waits this many seconds for its lock. */
const LOCK_WAIT_SECONDS = 120;

/**
 * Installs Debian packages without a question.
 * @throws ClusterProblem `apt-failed` with the line that failed and the end of what apt said
 */
export async function aptInstall(packages: readonly string[]): Promise<void> {
  if (packages.some((name) => name.startsWith('postgresql-'))) keepMainClusterAway();
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const lock = ['-o', `DPkg::Lock::Timeout=${LOCK_WAIT_SECONDS}`, '-o', 'Acquire::Retries=3'];
  const steps = [
    ['update', ...lock],
    ['install', '--yes', '--no-install-recommends', ...lock, ...packages],
  ];
  for (const args of steps) {
    const result = await runCommand('apt-get', args, { env });
    if (result.code !== 0) {
      throw new ClusterProblem('apt-failed', {
        line: aptLine(packages),
        said: (result.stderr || result.stdout).trim().split('\n').slice(-4).join(' '),
      });
    }
  }
}

/** Debian's package would start a server of its own on 5432; ours is private, so that one is never made. */
function keepMainClusterAway(): void {
  mkdirSync('/etc/postgresql-common/createcluster.d', { recursive: true });
  writeFileSync(
    '/etc/postgresql-common/createcluster.d/tetherline.conf',
    'create_main_cluster = false\n',
  );
}
