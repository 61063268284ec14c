import { type ChildProcess, spawn } from 'node:child_process';
import { chmodSync, cpSync, mkdtempSync, rmSync, symlinkSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { freePort } from '../../database/server/cluster.ts';

export const title =
  'npm start: seconds until the ready line (mark: under 8 s when everything is made)';

const root = resolve(import.meta.dirname, '../..');
const ROOMS = ['api', 'core', 'database', 'seeds-demo', 'web'];
const FILES = [
  'package.json',
  'package-lock.json',
  'tsconfig.json',
  'tsconfig.base.json',
  'vite.config.ts',
];
const AGAIN = 3;

/** Starts a scratch copy with a data folder of its own: once to make everything, then again and again. */
export async function run(): Promise<void> {
  const scratch = mkdtempSync(join(tmpdir(), 'tetherline-start-'));
  // PostgreSQL runs as another user, who has to reach its data folder in here.
  chmodSync(scratch, 0o711);
  try {
    for (const name of [...ROOMS, ...FILES]) {
      cpSync(join(root, name), join(scratch, name), { recursive: true });
    }
    symlinkSync(join(root, 'node_modules'), join(scratch, 'node_modules'));
    const port = await freePort();
    const first = await secondsToReady(scratch, port);
    console.log(`  first, packages there:  ${first.toFixed(1)} s`);
    for (let round = 1; round <= AGAIN; round += 1) {
      const again = await secondsToReady(scratch, port);
      console.log(`  again, ${round} of ${AGAIN}:          ${again.toFixed(1)} s`);
    }
  } finally {
    rmSync(scratch, { recursive: true, force: true, maxRetries: 5 });
  }
}

/** Runs `npm start` until its ready line, stops it and waits until it has stopped. */
async function secondsToReady(folder: string, port: number): Promise<number> {
  const { DATABASE_URL: _real, ...env } = process.env;
  const started = performance.now();
  const child = spawn('npm', ['start', '--silent'], {
    cwd: folder,
    env: { ...env, PORT: String(port), HOST: '127.0.0.1', DATA_DIR: join(folder, '.data') },
    stdio: ['ignore', 'pipe', 'pipe'],
    detached: true,
  });
  const ended = new Promise<void>((done) => child.once('exit', () => done()));
  try {
    await readyLine(child);
    return (performance.now() - started) / 1000;
  } finally {
    // npm does not hand signals on: the whole group is told.
    if (child.exitCode === null && child.pid !== undefined) process.kill(-child.pid, 'SIGTERM');
    await ended;
  }
}

function readyLine(child: ChildProcess): Promise<void> {
  let said = '';
  return new Promise((found, refuse) => {
    const hear = (text: string) => {
      said += text;
      if (/ready at http/.test(said)) found();
    };
    child.stdout?.setEncoding('utf8').on('data', hear);
    child.stderr?.setEncoding('utf8').on('data', hear);
    child.once('error', refuse);
    child.once('exit', (code) => refuse(new Error(`npm start ended with ${code}:\n${said}`)));
  });
}
