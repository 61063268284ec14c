import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ConfigProblem, isLoopback, loadConfig } from '../../api/config.ts';
import { loadSecrets, SecretProblem } from '../../api/secrets.ts';

/** The faults of an environment as `VARIABLE code`. */
function faultsOf(env: NodeJS.ProcessEnv): string[] {
  try {
    loadConfig(env);
    return [];
  } catch (error) {
    if (error instanceof ConfigProblem) {
      return error.faults.map((fault) => `${fault.variable} ${fault.code}`);
    }
    throw error;
  }
}

describe('the environment', () => {
  it('works on loopback with nothing set, as the demo', () => {
    const config = loadConfig({ PORT: '' });
    expect(config).toMatchObject({ host: '127.0.0.1', port: 5170, demo: true });
    expect(config.publicUrl).toBe('http://127.0.0.1:5170');
    expect(config.storage.local).toBe(true);
  });

  it('leaves the demo when a database of one’s own is named', () => {
    const config = loadConfig({
      DATABASE_URL: 'postgres://owner:pw@db.example/tetherline',
      HOST: '0.0.0.0',
      PUBLIC_URL: 'https://study.example/',
    });
    expect(config).toMatchObject({ demo: false, secureCookies: true });
    expect(config.publicUrl).toBe('https://study.example');
  });

  it.each([
    [{ HOST: '0.0.0.0' }, 'HOST demo-needs-loopback'],
    [{ HOST: '192.168.1.4' }, 'HOST demo-needs-loopback'],
    [{ PUBLIC_URL: 'https://study.example' }, 'PUBLIC_URL demo-needs-loopback'],
    [{ SMTP_URL: 'smtp://mail.example' }, 'SMTP_URL demo-needs-sink'],
    [{ DEMO: 'on', DATABASE_URL: 'postgres://a@b/c' }, 'DATABASE_URL demo-needs-private-database'],
  ])('refuses the demo together with %j', (env, fault) => {
    expect(faultsOf(env)).toContain(fault);
  });

  it('names every faulty variable at once', () => {
    expect(
      faultsOf({ PORT: 'eighty', DATABASE_URL: 'mysql://x', DB_ROLE_PREFIX: 'a-b', DEMO: 'yes' }),
    ).toEqual(['PORT port', 'DEMO on-off', 'DATABASE_URL database-url', 'DB_ROLE_PREFIX prefix']);
    expect(faultsOf({ PORT: '70000' })).toEqual(['PORT port']);
    expect(faultsOf({ S3_ENDPOINT: 'http://s3.example', S3_ACCESS_KEY_ID: 'k' })).toEqual([
      'S3_ACCESS_KEY_ID keys-together',
      'S3_BUCKET bucket-missing',
    ]);
  });

  it.each([
    ['127.0.0.1', true],
    ['127.8.0.1', true],
    ['localhost', true],
    ['::1', true],
    ['[::1]', true],
    ['0.0.0.0', false],
    ['127.0.0.1.example', false],
    ['::', false],
  ])('knows whether only this machine reaches %s', (host, expected) => {
    expect(isLoopback(host)).toBe(expected);
  });
});

describe('the secrets', () => {
  it('are made once, for their owner alone, and differ by purpose', () => {
    const folder = mkdtempSync(join(tmpdir(), 'tetherline-secrets-'));
    const first = loadSecrets(folder, {});
    expect(loadSecrets(folder, {})).toEqual(first);
    expect(statSync(join(folder, 'secret.json')).mode & 0o777).toBe(0o600);
    const all = [first.jwtKey, first.hashKey, first.clusterPassword, first.storageKey];
    all.push(...Object.values(first.rolePasswords));
    expect(new Set(all).size).toBe(7);
    const kept = readFileSync(join(folder, 'secret.json'), 'utf8');
    for (const secret of all) expect(kept).not.toContain(secret);
    rmSync(folder, { recursive: true });
  });

  it('come from the environment where machines share them, and a broken one is named', () => {
    const folder = mkdtempSync(join(tmpdir(), 'tetherline-secrets-'));
    const shared = { TETHERLINE_SECRET: 'ab'.repeat(32) };
    expect(loadSecrets('/nowhere', shared)).toEqual(loadSecrets('/elsewhere', shared));
    expect(() => loadSecrets(folder, { TETHERLINE_SECRET: 'short' })).toThrow(SecretProblem);
    writeFileSync(join(folder, 'secret.json'), '{');
    expect(() => loadSecrets(folder, {})).toThrow(SecretProblem);
    rmSync(folder, { recursive: true });
  });
});
