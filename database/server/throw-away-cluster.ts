import { randomBytes } from 'node:crypto';
import { chmodSync, chownSync, mkdirSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { findOrInstallBinaries } from './binaries.ts';
import { type Cluster, startCluster } from './cluster.ts';
import { isAlive } from './start-lock.ts';
import { serverUser } from './unprivileged-user.ts';

const PREFIX = 'tetherline-throw-away-';

/** A cluster in the temporary folder on a port of its own that vanishes when it is stopped. */
export async function startThrowAwayCluster(env: NodeJS.ProcessEnv): Promise<Cluster> {
  sweepLeftovers();
  const binaries = await findOrInstallBinaries(env);
  const user = serverUser();
  const base = mkdtempSync(join(tmpdir(), `${PREFIX}${process.pid}-`));
  const folder = join(base, 'postgres');
  mkdirSync(folder);
  chmodSync(base, 0o711);
  if (user) chownSync(folder, user.uid, user.gid);
  chmodSync(folder, 0o700);
  const cluster = await startCluster({
    binaries,
    folder,
    user,
    password: randomBytes(18).toString('base64url'),
    throwAway: true,
  });
  return {
    ...cluster,
    stop: async () => {
      await cluster.stop();
      rmSync(base, { recursive: true, force: true });
    },
  };
}

/** Folders of runs that were killed: their names carry the pid that made them. */
function sweepLeftovers(): void {
  for (const name of readdirSync(tmpdir())) {
    if (!name.startsWith(PREFIX)) continue;
    const pid = Number.parseInt(name.slice(PREFIX.length), 10);
    if (Number.isInteger(pid) && !isAlive(pid)) {
      rmSync(join(tmpdir(), name), { recursive: true, force: true });
    }
  }
}
