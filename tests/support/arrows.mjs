import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';

/** Reads every import and fails on one that points the wrong way, and where nothing could be read at all. */
const root = resolve(import.meta.dirname, '../..');
const rooms = ['api', 'core', 'database', 'web', 'seeds-demo', 'tests'].filter((room) =>
  existsSync(resolve(root, room)),
);
const result = spawnSync(
  process.execPath,
  [
    '--import',
    new URL('./swc-reads-tsx.mjs', import.meta.url).href,
    resolve(root, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs'),
    '--config',
    '.dependency-cruiser.cjs',
    '--output-type',
    'json',
    ...rooms,
  ],
  { cwd: root, encoding: 'utf8', maxBuffer: 1 << 28 },
);
let report;
try {
  report = JSON.parse(result.stdout);
} catch {
  console.error(result.stderr || result.stdout || result.error);
  process.exit(1);
}
const { totalCruised, violations } = report.summary;
for (const { rule, from, to, cycle } of violations) {
  const path = cycle ? cycle.map((step) => step.name).join(' → ') : to;
  console.error(`${rule.severity} ${rule.name}: ${from} → ${path}`);
}
// Without a working parser every file is found but none is read: then no file of a room imports anything.
const silent = rooms.filter(
  (room) =>
    !report.modules.some(
      ({ source, dependencies }) => source.startsWith(`${room}/`) && dependencies.length > 0,
    ),
);
if (silent.length > 0)
  console.error(`No import was read in ${silent.join(', ')}: is @swc/core installed?`);
console.log(`${totalCruised} modules, ${violations.length} arrows the wrong way`);
process.exit(violations.length > 0 || silent.length > 0 ? 1 : 0);
