import { accessSync, constants, readdirSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { aptInstall, aptLine, canInstall } from './apt.ts';
import { ClusterProblem } from './cluster-problem.ts';
import { runCommand } from './run-command.ts';

/** The version Debian 12 carries and everything is tested on. */
export const POSTGRES_PACKAGE = 'postgresql-15';
const OLDEST_MAJOR = 15;
const DEBIAN_FOLDER = '/usr/lib/postgresql';

export interface Binaries {
  /** Folder that holds initdb, postgres and pg_isready. */
  folder: string;
  major: number;
}

/**
 * PostgreSQL's programs: `$PG_BIN`, then Debian's folders newest first, then PATH; installed when missing
 * and that is allowed.
 * @param wantedMajor the version that made an existing data folder, which no other can open
 * @throws ClusterProblem `postgres-missing` with the line that installs it
 */
export async function findOrInstallBinaries(
  env: NodeJS.ProcessEnv,
  wantedMajor?: number,
): Promise<Binaries> {
  const found = await findBinaries(env, wantedMajor);
  if (found) return found;
  const name = wantedMajor === undefined ? POSTGRES_PACKAGE : `postgresql-${wantedMajor}`;
  if (canInstall()) {
    await aptInstall([name]);
    const installed = await findBinaries(env, wantedMajor);
    if (installed) return installed;
  }
  throw new ClusterProblem(
    wantedMajor === undefined ? 'postgres-missing' : 'postgres-version-missing',
    { major: String(wantedMajor ?? OLDEST_MAJOR), line: aptLine([name]) },
  );
}

export async function findBinaries(
  env: NodeJS.ProcessEnv,
  wantedMajor?: number,
): Promise<Binaries | undefined> {
  for (const folder of candidateFolders(env)) {
    if (!holdsServer(folder)) continue;
    const major = await majorOf(folder);
    if (major === undefined || major < OLDEST_MAJOR) continue;
    if (wantedMajor === undefined || major === wantedMajor) return { folder, major };
  }
  return undefined;
}

function candidateFolders(env: NodeJS.ProcessEnv): string[] {
  const folders: string[] = [];
  if (env.PG_BIN) folders.push(env.PG_BIN);
  const versions = listFolder(DEBIAN_FOLDER)
    .map(Number)
    .filter((version) => Number.isInteger(version))
    .sort((a, b) => b - a);
  folders.push(...versions.map((version) => join(DEBIAN_FOLDER, String(version), 'bin')));
  folders.push(...(env.PATH ?? '').split(delimiter).filter(Boolean));
  return folders;
}

function listFolder(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return [];
    throw error;
  }
}

function holdsServer(folder: string): boolean {
  return ['initdb', 'postgres', 'pg_isready'].every((program) => {
    try {
      accessSync(join(folder, program), constants.X_OK);
      return true;
    } catch {
      return false;
    }
  });
}

async function majorOf(folder: string): Promise<number | undefined> {
  const said = await runCommand(join(folder, 'postgres'), ['--version']);
  const digits = /(\d+)(?:\.\d+)?/.exec(said.stdout)?.[1];
  return digits === undefined ? undefined : Number(digits);
}
