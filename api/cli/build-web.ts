import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** Everything the build reads; a change in any of it makes the pages anew. */
const INPUTS = ['web', 'api/contracts', 'core', 'vite.config.ts', 'package-lock.json'];

/**
 * Builds the pages when their inputs changed.
 * @returns the folder of the built pages
 */
export async function buildWeb(root: string, say: (event: 'building') => void = () => undefined) {
  const folder = join(root, 'dist/web');
  const stamp = join(root, 'dist/web.stamp');
  const hash = hashInputs(root);
  const known = existsSync(stamp) ? readFileSync(stamp, 'utf8') : '';
  if (known === hash && existsSync(join(folder, 'index.html'))) return folder;
  say('building');
  // A build that is cut off must not pass for a finished one.
  rmSync(stamp, { force: true });
  const { build } = await import('vite');
  await build({ configFile: join(root, 'vite.config.ts'), logLevel: 'warn', mode: 'production' });
  mkdirSync(join(root, 'dist'), { recursive: true });
  writeFileSync(stamp, hash);
  return folder;
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
