import { type ChildProcess, spawn } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findOrInstallBinaries } from '../../database/server/binaries.ts';
import { type Cluster, startCluster } from '../../database/server/cluster.ts';
import { ClusterProblem } from '../../database/server/cluster-problem.ts';
import { chooseDataFolder } from '../../database/server/data-folder.ts';
import { pidFile, readPostmaster } from '../../database/server/postmaster.ts';
import { isAlive, takeStartLock } from '../../database/server/start-lock.ts';

const PASSWORD = 'password of this test';

describe('the private PostgreSQL', { timeout: 90_000 }, () => {
  let base: string;
  beforeAll(() => {
    base = mkdtempSync(join(tmpdir(), 'tetherline-cluster-'));
    chmodSync(base, 0o711);
  });
  afterAll(() => rmSync(base, { recursive: true, force: true }));

  async function start(): Promise<Cluster> {
    const folder = await chooseDataFolder('/nowhere', { DATA_DIR: base });
    const binaries = await findOrInstallBinaries(process.env, folder.existingMajor);
    const { cluster, user } = folder;
    return await startCluster({ binaries, folder: cluster, user, password: PASSWORD });
  }

  async function ask(url: string, sql: string): Promise<unknown[]> {
    const client = new pg.Client({ connectionString: url });
    await client.connect();
    const result = await client.query({ text: sql, rowMode: 'array' });
    await client.end();
    return result.rows.flat();
  }

  it('listens on loopback alone, asks for the password, keeps its data, and is joined by a second start', async () => {
    const first = await start();
    expect(first.startedHere).toBe(true);
    const url = first.urlFor('postgres');
    expect(await ask(url, 'SHOW listen_addresses')).toEqual(['127.0.0.1']);
    expect(await ask(url, 'SHOW unix_socket_directories')).toEqual(['']);
    await expect(ask(url.replace(/:[^:@]+@/, ':wrong@'), 'SELECT 1')).rejects.toMatchObject({
      code: '28P01',
    });
    await ask(url, "CREATE TABLE kept AS SELECT 'still here' AS word");

    const second = await start();
    expect(second).toMatchObject({ startedHere: false, port: first.port });
    await second.stop();
    expect(await ask(url, 'SELECT word FROM kept')).toEqual(['still here']);
    await first.stop();
    expect(readPostmaster(join(base, 'postgres'))).toBeUndefined();

    const again = await start();
    expect(await ask(again.urlFor('postgres'), 'SELECT word FROM kept')).toEqual(['still here']);
    await again.stop();
  });

  it('starts over a pid file of a crash, also when the pid now belongs to another program', async () => {
    const file = pidFile(join(base, 'postgres'));
    for (const pid of [process.pid, 2 ** 22 - 1]) {
      writeFileSync(file, `${pid}\n${join(base, 'postgres')}\n0\n5999\n\n127.0.0.1\n\nready\n`);
      const cluster = await start();
      expect(await ask(cluster.urlFor('postgres'), 'SELECT 1')).toEqual([1]);
      await cluster.stop();
    }
  });

  it('never outlives the process that started it, however that ends', async () => {
    const child = startInChild(base);
    const pid = await readyPid(child, join(base, 'postgres'));
    child.kill('SIGKILL');
    for (let waited = 0; isAlive(pid) && waited < 10_000; waited += 50) await pause(50);
    expect(isAlive(pid)).toBe(false);
    const cluster = await start();
    expect(cluster.startedHere).toBe(true);
    await cluster.stop();
  });

  it('keeps what others own out of its way: a folder that cannot be used is named', async () => {
    const file = join(base, 'a-file');
    writeFileSync(file, '');
    await expect(chooseDataFolder('/nowhere', { DATA_DIR: file })).rejects.toMatchObject({
      code: 'data-folder-unusable',
      params: { folder: file },
    });
  });

  it('goes elsewhere when the repository lies where its user can’t write', async () => {
    const closed = join(base, 'closed');
    mkdirSync(join(closed, 'repository'), { recursive: true });
    // Root hands the server to another user, who can't pass here; anybody else can't write here themselves.
    chmodSync(closed, 0o700);
    chmodSync(join(closed, 'repository'), 0o500);
    const folder = await chooseDataFolder(join(closed, 'repository'), {});
    expect(folder.base.startsWith(closed)).toBe(false);
    expect(folder.base).toMatch(/tetherline-[0-9a-f]{12}$/);
    rmSync(folder.base, { recursive: true });
    chmodSync(join(closed, 'repository'), 0o700);
  });
});

describe('the lock of a start', () => {
  const folder = mkdtempSync(join(tmpdir(), 'tetherline-lock-'));
  const file = join(folder, 'start.lock');
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it('is held by one, taken over from the dead, and given back', async () => {
    writeFileSync(file, String(2 ** 22 - 1));
    const unlock = await takeStartLock(file, 0);
    expect(readFileSync(file, 'utf8')).toBe(String(process.pid));
    unlock();
    expect(existsSync(file)).toBe(false);
  });

  it('refuses while a living process holds it, and names it', async () => {
    writeFileSync(file, String(process.ppid));
    const refusal = await takeStartLock(file, 300).catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(ClusterProblem);
    expect(refusal).toMatchObject({ code: 'locked', params: { pid: String(process.ppid) } });
    rmSync(file);
  });
});

/** A process that starts the cluster and then does nothing, to be killed. */
function startInChild(base: string): ChildProcess {
  const server = resolve(import.meta.dirname, '../../database/server');
  const script = `
    const { chooseDataFolder } = await import('${server}/data-folder.ts');
    const { findOrInstallBinaries } = await import('${server}/binaries.ts');
    const { startCluster } = await import('${server}/cluster.ts');
    const folder = await chooseDataFolder('/nowhere', { DATA_DIR: '${base}' });
    const binaries = await findOrInstallBinaries(process.env, folder.existingMajor);
    await startCluster({ binaries, folder: folder.cluster, user: folder.user, password: '${PASSWORD}' });
    setInterval(() => 0, 1000);
    console.log('ready');
  `;
  return spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', script], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
}

function readyPid(child: ChildProcess, cluster: string): Promise<number> {
  return new Promise((found, refuse) => {
    child.on('exit', (code) => refuse(new Error(`ended with ${code}`)));
    child.stdout?.on('data', () => found(readPostmaster(cluster)?.pid ?? 0));
  });
}
