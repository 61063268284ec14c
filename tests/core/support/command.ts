import { spawn } from 'node:child_process';
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

const AT_ONCE = 2;
let running = 0;
const waiting: (() => void)[] = [];

/** Runs the headless command as `npm run --silent analyse -- …` does; at most two at a time. */
export async function command(...args: string[]): Promise<Outcome> {
  if (running >= AT_ONCE) await new Promise<void>((go) => waiting.push(go));
  running++;
  try {
    return await run(args);
  } finally {
    running--;
    waiting.shift()?.();
  }
}

function run(args: string[]): Promise<Outcome> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'api/cli/analyse.ts', ...args], {
      cwd: repository,
      stdio: ['ignore', 'pipe', 'pipe'],
      timeout: 180_000,
    });
    const out: Buffer[] = [];
    const err: Buffer[] = [];
    child.stdout.on('data', (chunk: Buffer) => out.push(chunk));
    child.stderr.on('data', (chunk: Buffer) => err.push(chunk));
    child.on('error', reject);
    child.on('close', (code) =>
      resolve({
        code,
        stdout: Buffer.concat(out).toString(),
        stderr: Buffer.concat(err).toString(),
      }),
    );
  });
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
