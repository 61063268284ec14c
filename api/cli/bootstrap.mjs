import { resolve } from 'node:path';
import { ensurePackages, requireNode } from './bootstrap/packages.mjs';
import { words } from './bootstrap/words.mjs';

/** Only what comes with Node stands above this line: on a fresh clone nothing else is there yet. */
const ENTRIES = { start: './start.ts', dev: './dev.ts' };

const command = process.argv[2] ?? 'start';
const entry = ENTRIES[command];
if (entry === undefined) {
  console.error(words.unknownCommand(command));
  process.exit(2);
}
const root = resolve(import.meta.dirname, '../..');
requireNode();
ensurePackages(root);

// The server runs in this very process, so that a signal reaches it without a shell or npm in between.
const { register } = await import('tsx/esm/api');
register();
const { main } = await import(entry);
await main(root);
