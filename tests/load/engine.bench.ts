import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { median, ms, printLimit, printRatio } from './measure.ts';
import { needR, runR } from './r-program.ts';

export const title = 'Engine: pooled line with cluster-robust errors, beside R side by side';

const ROUNDS = 5;
const REPEATS = 15;
const repository = fileURLToPath(new URL('../../', import.meta.url));

interface Timed {
  first: number;
  repeated: number;
  /** Ours only: without grouping the readings by subject. */
  grouped?: number;
  slope: number;
  se: number;
}

/** Readings of a drifting cohort; the same bytes at each run (a small linear congruential generator). */
function cohort(subjects: number, visits: number): string {
  let state = 20261201;
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
  const normal = (): number =>
    Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  const lines = ['subject,time,y'];
  for (let i = 0; i < subjects; i++) {
    const level = 50 + 6 * normal();
    const slope = 0.4 + 0.5 * normal();
    for (let j = 0; j < visits; j++) {
      const time = j * 4 + Math.floor(uniform() * 3);
      lines.push(`s${i},${time},${(level + slope * time + 3 * normal()).toFixed(3)}`);
    }
  }
  return `${lines.join('\n')}\n`;
}

function node(...args: string[]): { stdout: string; stderr: string; wall: number } {
  const started = performance.now();
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', 'tsx', ...args], {
    cwd: repository,
    encoding: 'utf8',
    maxBuffer: 256 * 1024 * 1024,
  });
  const wall = performance.now() - started;
  if (status !== 0) throw new Error(`${args[0]} ended with ${status}: ${stderr}`);
  return { stdout, stderr, wall };
}

const columns = ['--subject', 'subject', '--time', 'time', '--response', 'y'];

/** The command's own account of its time for the part `cr2`, in a fresh process. */
function commandCr2(file: string): number {
  const { stderr } = node('api/cli/analyse.ts', file, ...columns, '--only', 'cr', '--timings');
  const timings = JSON.parse(stderr.trimEnd().split('\n').at(-1) ?? '{}') as { cr2?: number };
  if (typeof timings.cr2 !== 'number') throw new Error('--timings has no cr2');
  return timings.cr2;
}

export async function run(): Promise<void> {
  needR();
  const folder = mkdtempSync(join(tmpdir(), 'tetherline-bench-'));
  try {
    const large = join(folder, 'large.csv');
    const small = join(folder, 'small.csv');
    writeFileSync(large, cohort(5000, 10));
    writeFileSync(small, cohort(100, 10));
    besideR(large);
    const walls = Array.from(
      { length: 5 },
      () => node('api/cli/analyse.ts', small, ...columns).wall,
    );
    printLimit(
      'headless command, everything, 1,000 rows, start of Node included',
      median(walls),
      2000,
    );
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function besideR(file: string): void {
  const command: number[] = [];
  const ours: Timed[] = [];
  const theirs: Timed[] = [];
  // Interleaved, so that a busy moment of the machine falls on both.
  for (let round = 0; round < ROUNDS; round++) {
    command.push(commandCr2(file));
    theirs.push(runR('cr2.R', file, String(REPEATS)) as Timed);
    ours.push(
      JSON.parse(node('tests/load/cr2-repeated.ts', file, String(REPEATS)).stdout) as Timed,
    );
  }
  const [our, their] = [ours[0]!, theirs[0]!];
  if (Math.abs(our.slope / their.slope - 1) > 1e-9 || Math.abs(our.se / their.se - 1) > 1e-9) {
    throw new Error(
      `not the same numbers: ${our.slope} (${our.se}) and ${their.slope} (${their.se})`,
    );
  }
  const first = median(theirs.map((t) => t.first));
  console.log(
    `  5,000 subjects x 10 readings, medians of ${ROUNDS} interleaved rounds; ours: CR0 to CR3,`,
  );
  console.log(
    '  Satterthwaite df and p; R: lm and vcovCL HC1, no df. Same slope and CR1S error to 1e-9.',
  );
  printRatio('command, cr2 in a fresh process against the first call in R', median(command), first);
  printRatio('first call in a process', median(ours.map((t) => t.first)), first);
  const repeated = median(theirs.map((t) => t.repeated));
  printRatio('repeated calls, grouping included', median(ours.map((t) => t.repeated)), repeated);
  printRatio(
    'repeated calls, grouped already',
    median(ours.map((t) => t.grouped ?? t.repeated)),
    repeated,
  );
  console.log(
    `  spread of the command's cr2: ${ms(Math.min(...command))} to ${ms(Math.max(...command))}`,
  );
}
