import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { MissingTool } from './missing-tool.ts';

const PACKAGES = ['r-base-core', 'r-cran-sandwich', 'r-cran-jsonlite'];
const APT = `apt-get install -y --no-install-recommends ${PACKAGES.join(' ')}`;

function hasR(): boolean {
  const probe =
    'quit(status = !all(sapply(c("sandwich", "jsonlite"), requireNamespace, quietly = TRUE)))';
  return spawnSync('Rscript', ['-e', probe], { stdio: 'ignore' }).status === 0;
}

/**
 * Makes sure that R and the packages of the comparison are there, installing them where this user may.
 *
 * @throws MissingTool with the one line to run by hand
 */
export function needR(): void {
  if (hasR()) return;
  if (process.getuid?.() === 0) {
    const quiet = {
      stdio: 'ignore',
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    } as const;
    spawnSync('apt-get', ['update'], quiet);
    spawnSync('apt-get', APT.split(' ').slice(1), quiet);
    if (hasR()) return;
  }
  throw new MissingTool(`R is missing, and the comparison is with it. As root run: ${APT}`);
}

/** Runs an R script of this folder and reads the JSON that it prints. */
export function runR(script: string, ...args: string[]): unknown {
  const path = fileURLToPath(new URL(script, import.meta.url));
  const { status, stdout, stderr } = spawnSync('Rscript', ['--vanilla', path, ...args], {
    encoding: 'utf8',
  });
  if (status !== 0) throw new Error(`${script} ended with ${status}: ${stderr}`);
  return JSON.parse(stdout);
}
