/** The commands that keep an installation, run as a person runs them. */
import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { SETUP } from './subjects-study.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));

let database: TestDatabase;
let folder: string;

beforeAll(async () => {
  database = await createTestDatabase();
  folder = mkdtempSync(join(tmpdir(), 'tetherline-commands-'));
  writeFileSync(join(folder, 'setup.json'), JSON.stringify(SETUP));
});
afterAll(async () => {
  await database.drop();
  rmSync(folder, { recursive: true, force: true });
});

async function run(command: string, args: readonly string[] = [], typed = '') {
  const child = spawn(
    process.execPath,
    ['--no-warnings', '--import', 'tsx', `api/cli/${command}.ts`, ...args],
    {
      cwd: root,
      env: {
        PATH: process.env.PATH,
        DEMO: 'off',
        DATABASE_URL: database.ownerUrl,
        DATA_DIR: folder,
        // Roles of its own: the passwords of the test run's stay as they are.
        DB_ROLE_PREFIX: `${database.roles.rolePrefix}_c`,
        TETHERLINE_SECRET: 'c0'.repeat(32),
      },
    },
  );
  child.stdin.end(typed);
  const [out, err, code] = await Promise.all([
    text(child.stdout),
    text(child.stderr),
    new Promise<number | null>((resolve) => child.once('close', resolve)),
  ]);
  return { out, err, code };
}

const people = ['--admin', 'ada@x.example', '--owner', 'ola@x.example'];
const setupFile = () => ['--setup', join(folder, 'setup.json')];
const passwords = 'nine green bottles\neight maids milking\n';

describe('first-owner', { timeout: 120_000 }, () => {
  it('says which argument is missing, and how the command goes', async () => {
    const { code, err } = await run('first-owner', people);
    expect(code).toBe(2);
    expect(err).toContain('--setup is missing.');
    expect(err).toContain('npm run first-owner --');
  });

  it('says what is wrong with a file and where, before it asks for a password', async () => {
    const file = join(folder, 'broken.json');
    const site = { code: '=A1', name: 'Hall', timeZone: 'UTC' };
    writeFileSync(file, JSON.stringify({ ...SETUP, sites: [site] }));
    const { code, err } = await run('first-owner', [...people, '--setup', file]);
    expect(code).toBe(2);
    expect(err).toContain('sites.0.code: Use 1 to 32 letters');
    const missing = await run('first-owner', [...people, '--setup', join(folder, 'none.json')]);
    expect(missing).toMatchObject({ code: 2 });
    expect(missing.err).toContain('ENOENT');
  });

  it('makes nothing with one password, and both people and the study with two', async () => {
    const half = await run('first-owner', [...people, ...setupFile()], 'nine green bottles\n');
    expect(half.code).toBe(2);
    expect(await database.query('SELECT id FROM account')).toEqual([]);
    const whole = await run('first-owner', [...people, ...setupFile()], passwords);
    expect(whole).toMatchObject({ code: 0, err: '' });
    expect(whole.out).toContain('ola@x.example');
    expect(whole.out).not.toContain('bottles');
    const accounts = await database.query('SELECT email FROM account ORDER BY id');
    expect(accounts).toEqual([{ email: 'ada@x.example' }, { email: 'ola@x.example' }]);
  });
});

describe('migrate and verify-audit', { timeout: 120_000 }, () => {
  it('leave a database that is up to date as it is', async () => {
    expect(await run('migrate')).toMatchObject({ code: 0, err: '' });
  });

  it('find the trail whole, and then the first entry that was changed', async () => {
    const whole = await run('verify-audit');
    expect(whole.code).toBe(0);
    expect(whole.out).toContain('The audit trail holds: 4 entries in 2 chains');
    await database.query('ALTER TABLE audit.entry DISABLE TRIGGER USER');
    await database.query(
      `UPDATE audit.entry SET body = replace(body, 'true', 'false') WHERE chain = 'installation' AND seq = 1`,
    );
    const broken = await run('verify-audit');
    expect(broken.code).toBe(1);
    expect(broken.err).toContain(
      'Chain installation, entry 1: the entry was changed after it was written.',
    );
  });
});
