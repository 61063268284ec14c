import { resolve } from 'node:path';
import { ensurePackages, requireNode } from '../api/cli/bootstrap/packages.mjs';

/** `npm test` on a fresh clone: packages first, then everything else in TypeScript. */
requireNode();
const root = resolve(import.meta.dirname, '..');
ensurePackages(root);
const { register } = await import('tsx/esm/api');
register();
const { runTests } = await import('./support/run-tests.ts');
process.exit(await runTests(root, process.argv.slice(2)));
