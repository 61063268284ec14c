import { resolve } from 'node:path';
import { ensurePackages, requireNode } from '../../api/cli/bootstrap/packages.mjs';

/** `npm run bench`, with packages first as every command. */
requireNode();
ensurePackages(resolve(import.meta.dirname, '../..'));
const { register } = await import('tsx/esm/api');
register();
await import('./bench.ts');
