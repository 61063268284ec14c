import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { words } from './words.mjs';

/** Oldest Node everything is tested on. */
const OLDEST = [20, 19];

/** Ends the process with a sentence where this Node can't run the program. */
export function requireNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major > OLDEST[0] || (major === OLDEST[0] && minor >= OLDEST[1])) return;
  console.error(words.nodeTooOld(process.version, `${OLDEST.join('.')} or later`));
  process.exit(2);
}

/**
 * Installs the packages of the lock file when they are missing, or when the lock or Node has changed.
 * Development packages too: the pages are built here, and npm would drop them where NODE_ENV says production.
 * @param {string} root folder of the repository
 */
export function ensurePackages(root) {
  const stamp = join(root, 'node_modules/.tetherline-stamp');
  const wanted = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .update(`${process.version} ${process.platform} ${process.arch}`)
    .digest('hex');
  const stamped = existsSync(stamp) ? readFileSync(stamp, 'utf8') : undefined;
  if (stamped === wanted) return;
  // Somebody may have installed by hand: what is whole already is not torn down and fetched again.
  if (stamped === undefined && holdsLock(root)) {
    writeFileSync(stamp, wanted);
    return;
  }
  console.error(words.installing);
  rmSync(stamp, { force: true });
  const result = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
    env: { ...process.env, NODE_ENV: '' },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  if (result.status !== 0) {
    console.error(words.installFailed(result.status ?? result.error?.message));
    process.exit(2);
  }
  writeFileSync(stamp, wanted);
}

/**
 * Whether npm's own record of the installed packages names all of the lock file, in the same versions.
 * @param {string} root
 */
function holdsLock(root) {
  const record = join(root, 'node_modules/.package-lock.json');
  if (!existsSync(record)) return false;
  const wanted = readJson(join(root, 'package-lock.json')).packages;
  const installed = readJson(record).packages;
  return Object.entries(wanted).every(
    ([path, { version, optional }]) =>
      path === '' || optional === true || installed[path]?.version === version,
  );
}

/** @param {string} file */
function readJson(file) {
  return JSON.parse(readFileSync(file, 'utf8'));
}
