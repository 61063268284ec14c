import { createHash, randomUUID } from 'node:crypto';
import {
  accessSync,
  chmodSync,
  chownSync,
  constants,
  existsSync,
  mkdirSync,
  readFileSync,
  rmSync,
} from 'node:fs';
import { homedir, tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { ClusterProblem } from './cluster-problem.ts';
import { runCommand } from './run-command.ts';
import { commandAs, type SystemUser, serverUser } from './unprivileged-user.ts';

export interface DataFolder {
  /** Holds secrets, files and letters of this installation; belongs to the person who starts it. */
  base: string;
  /** PostgreSQL's own folder; belongs to the user it runs as. */
  cluster: string;
  user: SystemUser | undefined;
  /** Major version that made the cluster, undefined where none exists yet. */
  existingMajor: number | undefined;
}

/**
 * The first folder in which the server's user can really work. A checkout below a folder only root may
 * enter is common, so each candidate is tried by writing in it as that user.
 * @param root the repository
 * @throws ClusterProblem `data-folder-unusable` for a folder that was asked for by name, `no-data-folder`
 *   with all that were tried otherwise
 */
export async function chooseDataFolder(root: string, env: NodeJS.ProcessEnv): Promise<DataFolder> {
  const asked = env.DATA_DIR ? resolve(root, env.DATA_DIR) : undefined;
  const bases = asked ? [asked] : candidateBases(root);
  const refused: string[] = [];
  for (const base of bases) {
    const cluster = env.PG_DATA_DIR ? resolve(root, env.PG_DATA_DIR) : join(base, 'postgres');
    const reason = await tryFolder(base, cluster);
    if (reason === undefined) {
      return {
        base,
        cluster,
        user: serverUser(existsSync(cluster) ? cluster : undefined),
        existingMajor: majorOfCluster(cluster),
      };
    }
    if (asked) throw new ClusterProblem('data-folder-unusable', { folder: asked, reason });
    refused.push(`${base} (${reason})`);
  }
  throw new ClusterProblem('no-data-folder', { tried: refused.join(', ') });
}

/**
 * The folder for secrets and files where PostgreSQL runs elsewhere.
 * @throws ClusterProblem as `chooseDataFolder`
 */
export function chooseBaseFolder(root: string, env: NodeJS.ProcessEnv): string {
  const asked = env.DATA_DIR ? resolve(root, env.DATA_DIR) : undefined;
  const refused: string[] = [];
  for (const base of asked ? [asked] : candidateBases(root)) {
    try {
      mkdirSync(base, { recursive: true, mode: 0o700 });
      accessSync(base, constants.W_OK | constants.X_OK);
      return base;
    } catch (error) {
      const reason = (error as Error).message;
      if (asked) throw new ClusterProblem('data-folder-unusable', { folder: asked, reason });
      refused.push(`${base} (${reason})`);
    }
  }
  throw new ClusterProblem('no-data-folder', { tried: refused.join(', ') });
}

function candidateBases(repository: string): string[] {
  // Spelled one way, since the name of the folder elsewhere follows from it.
  const root = resolve(repository);
  // The repository's own folder first; elsewhere the name carries the repository, so that two clones stay apart.
  const name = `tetherline-${createHash('sha256').update(root).digest('hex').slice(0, 12)}`;
  const state =
    process.getuid?.() === 0
      ? '/var/lib'
      : (process.env.XDG_STATE_HOME ?? join(homedir(), '.local/state'));
  return [join(root, '.data'), join(state, name), join(tmpdir(), name)];
}

/** Makes both folders ready and says why not when that fails. */
async function tryFolder(base: string, cluster: string): Promise<string | undefined> {
  const existed = existsSync(cluster);
  try {
    mkdirSync(base, { recursive: true });
    if (!existed) mkdirSync(cluster, { recursive: true });
    const user = serverUser(existed ? cluster : undefined);
    if (user) {
      // Others may pass through to the cluster but list nothing.
      chmodSync(base, 0o711);
      chownSync(cluster, user.uid, user.gid);
    }
    chmodSync(cluster, 0o700);
    const probe = join(cluster, `probe-${randomUUID()}`);
    const [program, args] = commandAs(user, 'touch', [probe], false);
    const result = await runCommand(program, args, { cwd: '/' });
    rmSync(probe, { force: true });
    return result.code === 0 ? undefined : result.stderr.trim();
  } catch (error) {
    return (error as Error).message;
  }
}

export function majorOfCluster(cluster: string): number | undefined {
  const file = join(cluster, 'PG_VERSION');
  return existsSync(file) ? Number.parseInt(readFileSync(file, 'utf8'), 10) : undefined;
}
