import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { runOrExplain } from '../../api/cli/failure.ts';
import { ensureSystemPackages } from './system-needs.ts';

interface Step {
  name: string;
  /** Script of an installed package, or of the repository, with its arguments. */
  args: string[];
}

interface Count {
  passed: number;
  failed: number;
}

const STEPS: Step[] = [
  {
    name: 'types: api, core, database, tests',
    args: ['typescript/bin/tsc', '-p', 'tsconfig.json'],
  },
  { name: 'types: core alone', args: ['typescript/bin/tsc', '-p', 'core'] },
  { name: 'types: web', args: ['typescript/bin/tsc', '-p', 'web'] },
  {
    name: 'format and lint',
    args: ['@biomejs/biome/bin/biome', 'check', '--error-on-warnings', '.'],
  },
  { name: 'arrows between rooms', args: ['./tests/support/arrows.mjs'] },
  { name: 'nothing unused', args: ['knip/bin/knip.js'] },
  { name: 'build of the pages', args: ['./tests/support/build-pages.mjs'] },
];

/**
 * Runs every check and every test, in a cluster of its own, and ends with one line of counts.
 * @param args passed on to vitest
 * @returns the exit code
 */
export async function runTests(root: string, args: readonly string[]): Promise<number> {
  let line: string | undefined;
  await runOrExplain(async () => {
    line = await ensureSystemPackages();
  });
  if (line !== undefined) {
    console.error(`The tests need packages of the system. Install them:\n  ${line}`);
    return 2;
  }
  const total: Count = { passed: 0, failed: 0 };
  for (const step of STEPS) add(total, await runStep(root, step));
  add(total, await runVitest(root, args));
  console.log(`${total.passed} passed, ${total.failed} failed`);
  return total.failed === 0 ? 0 : 1;
}

function add(total: Count, more: Count): void {
  total.passed += more.passed;
  total.failed += more.failed;
}

async function runStep(root: string, step: Step): Promise<Count> {
  const started = Date.now();
  const { code, output } = await run(root, step.args, true);
  const seconds = ((Date.now() - started) / 1000).toFixed(1);
  console.log(`${code === 0 ? 'ok    ' : 'FAILED'} ${step.name} (${seconds} s)`);
  if (code !== 0) console.log(output);
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

interface Report {
  numPassedTests: number;
  numFailedTests: number;
  numPendingTests: number;
  numTodoTests: number;
  testResults: { name: string; status: string; assertionResults: unknown[] }[];
}

async function runVitest(root: string, args: readonly string[]): Promise<Count> {
  const folder = mkdtempSync(join(tmpdir(), 'tetherline-report-'));
  const file = join(folder, 'report.json');
  try {
    const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
    const { code } = await run(root, ['vitest/vitest.mjs', 'run', ...reporters, ...args], false);
    return existsSync(file)
      ? countTests(JSON.parse(readFileSync(file, 'utf8')) as Report, code, args.length > 0)
      : { passed: 0, failed: 1 };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Also a file that could not be read, a test left out and a run that broke count as failures: nothing is skipped quietly. */
function countTests(report: Report, code: number, chosen: boolean): Count {
  const unread = report.testResults.filter(
    (file) => file.status === 'failed' && file.assertionResults.length === 0,
  );
  const leftOut = chosen ? 0 : report.numPendingTests + report.numTodoTests;
  if (leftOut > 0) console.log(`FAILED ${leftOut} tests are skipped`);
  const failed = report.numFailedTests + unread.length + leftOut;
  return {
    passed: report.numPassedTests,
    failed: failed === 0 && code !== 0 ? 1 : failed,
  };
}

function run(
  root: string,
  [script = '', ...args]: string[],
  gather: boolean,
): Promise<{ code: number; output: string }> {
  const path = script.startsWith('./') ? join(root, script) : join(root, 'node_modules', script);
  // The tests never meet the database a person works with.
  const { DATABASE_URL: _real, NODE_ENV: _mode, ...env } = process.env;
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [path, ...args], {
      cwd: root,
      env,
      stdio: ['ignore', gather ? 'pipe' : 'inherit', gather ? 'pipe' : 'inherit'],
    });
    let output = '';
    for (const pipe of [child.stdout, child.stderr]) {
      pipe?.setEncoding('utf8').on('data', (text: string) => {
        output += text;
      });
    }
    child.on('error', (error) => resolve({ code: 1, output: output + error.message }));
    child.on('close', (code) => resolve({ code: code ?? 1, output }));
  });
}
