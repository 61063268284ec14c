import { resolve } from 'node:path';
import { register } from 'tsx/esm/api';

/** Builds the pages as `npm start` does, so that a page that can't be built fails by itself. */
register();
const { buildWeb } = await import('../../api/cli/build-web.ts');
console.log(await buildWeb(resolve(import.meta.dirname, '../..')));
process.exit(0);
