import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const repository = fileURLToPath(new URL('../../../', import.meta.url));

export interface Outcome {
  code: number | null;
  stdout: string;
  stderr: string;
}

/** Runs the headless command as `npm run --silent analyse -- …` does. */
export function command(...args: string[]): Outcome {
  const { status, stdout, stderr, error } = spawnSync(
    process.execPath,
    ['--import', 'tsx', 'api/cli/analyse.ts', ...args],
    { cwd: repository, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024, timeout: 60_000 },
  );
  if (error) throw error;
  return { code: status, stdout, stderr };
}

/** A folder of files for one test file, removed by `clear`. */
export function scratch(): {
  file(name: string, content: string | Uint8Array): string;
  folder: string;
  clear(): void;
} {
  const folder = mkdtempSync(join(tmpdir(), 'tetherline-command-'));
  return {
    folder,
    file(name, content) {
      const path = join(folder, name);
      writeFileSync(path, content);
      return path;
    },
    clear: () => rmSync(folder, { recursive: true, force: true }),
  };
}
