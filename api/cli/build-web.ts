import { createHash } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
} from 'node:fs';
import { join } from 'node:path';

/** Everything the build reads; a change in any of it makes the pages anew. */
const INPUTS = ['web', 'api/contracts', 'core', 'vite.config.ts', 'package-lock.json'];

/** Builds kept beside the present one, for servers that still hand out their files. */
const KEPT = 3;

/**
 * Builds the pages when their inputs changed. Each state of the inputs has a folder of its own, which
 * appears whole: a server that runs never loses the files it has promised.
 * @returns the folder of the built pages
 */
export async function buildWeb(root: string, say: () => void = () => undefined): Promise<string> {
  const dist = join(root, 'dist');
  const folder = join(dist, `web-${hashInputs(root).slice(0, 16)}`);
  if (existsSync(folder)) return folder;
  say();
  mkdirSync(dist, { recursive: true });
  const draft = mkdtempSync(join(dist, 'building-'));
  try {
    await buildInto(draft, root);
    // Another start may have been quicker with the same pages: then those are as good.
    if (!existsSync(folder)) renameSync(draft, folder);
  } finally {
    rmSync(draft, { recursive: true, force: true });
  }
  dropOldBuilds(dist, folder);
  return folder;
}

/**
 * Vite lets NODE_ENV decide over its own mode. The tests set it to something else, and their build would
 * then carry React's much larger one for development, which the next start would find and serve.
 */
async function buildInto(folder: string, root: string): Promise<void> {
  const { NODE_ENV: before } = process.env;
  process.env.NODE_ENV = 'production';
  try {
    const { build } = await import('vite');
    await build({
      configFile: join(root, 'vite.config.ts'),
      logLevel: 'warn',
      mode: 'production',
      build: { outDir: folder, emptyOutDir: true },
    });
  } finally {
    if (before === undefined) delete process.env.NODE_ENV;
    else process.env.NODE_ENV = before;
  }
}

function dropOldBuilds(dist: string, present: string): void {
  const others = readdirSync(dist)
    .filter((name) => name.startsWith('web-'))
    .map((name) => join(dist, name))
    .filter((folder) => folder !== present)
    .sort((a, b) => statSync(b).mtimeMs - statSync(a).mtimeMs);
  for (const folder of others.slice(KEPT)) rmSync(folder, { recursive: true, force: true });
}

function hashInputs(root: string): string {
  const hash = createHash('sha256');
  hash.update(process.version);
  for (const input of INPUTS) {
    for (const file of filesBelow(root, input)) {
      const bytes = readFileSync(join(root, file));
      hash.update(`${file}\0${bytes.length}\0`).update(bytes);
    }
  }
  return hash.digest('hex');
}

function filesBelow(root: string, path: string): string[] {
  const full = join(root, path);
  if (!existsSync(full)) return [];
  if (path.includes('.')) return [path];
  return readdirSync(full, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name).slice(root.length + 1))
    .sort();
}
