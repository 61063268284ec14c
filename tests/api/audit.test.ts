import { randomUUID } from 'node:crypto';
import { Readable } from 'node:stream';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Actor } from '../../api/audit/actor.ts';
import { anchorHeads } from '../../api/audit/anchors.ts';
import type { AuditInput } from '../../api/audit/entry-body.ts';
import { inTransaction } from '../../api/audit/transaction.ts';
import { verifyChains } from '../../api/audit/verify.ts';
import type { ObjectStore } from '../../api/storage/object-store.ts';
import type { Databases } from '../../database/data-source.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';

const AT = new Date('2026-10-25T00:30:00.000Z');

let database: TestDatabase;
let databases: Databases;
let actor: Actor;
/** Each test writes a chain of its own. */
let chain: string;

beforeAll(async () => {
  database = await createTestDatabase();
  databases = await database.databases();
  const [account] = await database.query<{ id: string; uid: string }>(
    `INSERT INTO account (email, name, password_hash, created_at) VALUES ('a@x.example', 'Ada', 'x', now())
     RETURNING id, uid`,
  );
  actor = {
    accountId: account?.id ?? '',
    accountUid: account?.uid ?? '',
    name: 'Ada',
    role: 'coordinator',
    sessionUid: null,
    requestId: 'request-1',
  };
});
afterAll(() => database.drop());
beforeEach(() => {
  chain = randomUUID();
});

const entry = (over: Partial<AuditInput> = {}): AuditInput => ({
  at: AT,
  studyUid: chain,
  action: 'tried',
  entity: 'account',
  entityUid: null,
  before: { b: 1, a: [0.1, null, 'ü\n'] },
  after: { z: { y: 1, x: 2 } },
  ...over,
});

const write = (over: Partial<AuditInput> = {}) =>
  inTransaction(databases.masked, actor, async (tx) => tx.audit(entry(over)));

/** Changes what nobody may change, as someone with the server in hand would. */
async function forge(sql: string): Promise<void> {
  await database.query('ALTER TABLE audit.entry DISABLE TRIGGER USER');
  await database.query('ALTER TABLE audit.chain DISABLE TRIGGER USER');
  await database.query(sql);
  await database.query('ALTER TABLE audit.entry ENABLE TRIGGER USER');
  await database.query('ALTER TABLE audit.chain ENABLE TRIGGER USER');
}

const brokenLinks = async (store?: ObjectStore) =>
  (await verifyChains(databases.masked, store)).broken.filter((link) => link.chain === chain);

describe('writing', () => {
  it('keeps who, with which role, when, what, before, after and why', async () => {
    await write({ reason: 'because' });
    const [row] = await database.query('SELECT * FROM audit.entry WHERE chain = $1', [chain]);
    expect(row).toMatchObject({
      chain,
      seq: '1',
      at: AT,
      account_id: actor.accountId,
      actor_name: 'Ada',
      role_then: 'coordinator',
      request_id: 'request-1',
      action: 'tried',
      before: { b: 1, a: [0.1, null, 'ü\n'] },
      after: { z: { y: 1, x: 2 } },
      reason: 'because',
    });
    expect(await brokenLinks()).toEqual([]);
  });

  it('leaves nothing of a transaction that rolls back, and no gap', async () => {
    await write();
    await expect(
      inTransaction(databases.masked, actor, async (tx) => {
        tx.audit(entry());
        await tx.manager.query(`UPDATE account SET name = 'changed'`);
        await tx.manager.query('SELECT 1 / 0');
      }),
    ).rejects.toThrow('division by zero');
    await write();
    const rows = await database.query('SELECT seq FROM audit.entry WHERE chain = $1 ORDER BY seq', [
      chain,
    ]);
    expect(rows).toEqual([{ seq: '1' }, { seq: '2' }]);
    expect(await database.query('SELECT name FROM account')).toEqual([{ name: 'Ada' }]);
  });

  it('takes back the change when the entry can’t be written', async () => {
    await expect(
      inTransaction(databases.masked, actor, async (tx) => {
        await tx.manager.query(`UPDATE account SET name = 'changed'`);
        tx.audit(entry({ entityUid: 'not an id' }));
      }),
    ).rejects.toThrow('uuid');
    expect(await database.query('SELECT name FROM account')).toEqual([{ name: 'Ada' }]);
  });

  it('keeps the order of twenty writers on two chains at once', async () => {
    const before = await verifyChains(databases.masked);
    const chains: string[] = [randomUUID(), randomUUID()];
    await Promise.all(
      Array.from({ length: 20 }, (_, at) =>
        inTransaction(databases.masked, actor, async (tx) => {
          // Both chains, asked for in either order: taken in one, so no two writers block each other.
          const order = at % 2 === 0 ? chains : [...chains].reverse();
          for (const studyUid of order) {
            tx.audit(entry({ studyUid }));
          }
        }),
      ),
    );
    const found = await verifyChains(databases.masked);
    expect(found).toMatchObject({ chains: before.chains + 2, entries: before.entries + 40 });
    expect(found.broken.filter((link) => chains.includes(link.chain))).toEqual([]);
  });

  it('is refused under another isolation than READ COMMITTED', async () => {
    await expect(
      databases.masked.transaction('REPEATABLE READ', (manager) =>
        manager.query(`SELECT audit.append('installation', '{}')`),
      ),
    ).rejects.toMatchObject({ code: '25001' });
  });
});

describe('what is written', () => {
  beforeEach(async () => {
    await write();
    await write();
    await write();
  });

  it.each([
    'UPDATE audit.entry SET reason = NULL',
    'DELETE FROM audit.entry',
    'TRUNCATE audit.entry',
    'DELETE FROM audit.chain',
    'TRUNCATE audit.chain CASCADE',
    'UPDATE audit.chain SET head_seq = 1',
  ])('stays, also against the owner: %s', async (statement) => {
    await expect(database.query(statement)).rejects.toMatchObject({ code: '55000' });
    expect(await brokenLinks()).toEqual([]);
  });

  it('shows a body changed later', async () => {
    await forge(`UPDATE audit.entry SET body = replace(body, 'tried', 'tired') WHERE seq = 2`);
    expect(await brokenLinks()).toEqual([{ chain, seq: 2, code: 'hash differs' }]);
  });

  it('shows a column changed later while the body stays', async () => {
    await forge(`UPDATE audit.entry SET after = '{}' WHERE seq = 3 AND chain = '${chain}'`);
    expect(await brokenLinks()).toEqual([{ chain, seq: 3, code: 'columns differ' }]);
  });

  it('shows an entry taken out of the middle', async () => {
    await forge(`DELETE FROM audit.entry WHERE seq = 2 AND chain = '${chain}'`);
    expect(await brokenLinks()).toEqual([{ chain, seq: 2, code: 'entry missing' }]);
  });

  it('shows a body changed together with its own hash', async () => {
    await forge(`UPDATE audit.entry SET body = replace(body, 'tried', 'tired'),
      hash = encode(sha256(convert_to(previous_hash || E'\\n' || chain || E'\\n' || seq || E'\\n' ||
        replace(body, 'tried', 'tired'), 'UTF8')), 'hex'), action = 'tired' WHERE seq = 2 AND chain = '${chain}'`);
    expect(await brokenLinks()).toEqual([{ chain, seq: 3, code: 'previous hash differs' }]);
  });

  it('shows a tail cut off while the head stays', async () => {
    await forge(`DELETE FROM audit.entry WHERE seq = 3 AND chain = '${chain}'`);
    expect(await brokenLinks()).toEqual([{ chain, seq: 3, code: 'entry missing' }]);
  });

  it('shows a tail and a head cut off together, by the heads stored elsewhere', async () => {
    const store = memoryStore();
    expect(await anchorHeads(databases.masked, store, () => AT)).toBeGreaterThan(0);
    await forge(`DELETE FROM audit.entry WHERE seq = 3 AND chain = '${chain}';
      UPDATE audit.chain SET head_seq = 2, head_hash =
        (SELECT hash FROM audit.entry WHERE seq = 2 AND chain = '${chain}') WHERE name = '${chain}'`);
    expect(await brokenLinks()).toEqual([]);
    expect(await brokenLinks(store)).toEqual([{ chain, seq: 3, code: 'anchored entry missing' }]);
    // The chain written on after the cut is longer again, and still not the one that was stored.
    await write({ action: 'other' });
    expect(await brokenLinks(store)).toEqual([{ chain, seq: 3, code: 'anchor differs' }]);
  });

  it('shows a chain that is gone altogether', async () => {
    const store = memoryStore();
    await anchorHeads(databases.masked, store, () => AT);
    await forge(`DELETE FROM audit.entry WHERE chain = '${chain}';
      DELETE FROM audit.chain WHERE name = '${chain}'`);
    expect(await brokenLinks(store)).toEqual([{ chain, seq: 1, code: 'anchored entry missing' }]);
  });
});

function memoryStore(): ObjectStore {
  const files = new Map<string, Buffer>();
  return {
    put: async (key, body) => {
      files.set(key, body as Buffer);
    },
    get: async (key) => Readable.from([files.get(key) ?? Buffer.alloc(0)]),
    delete: async (key) => {
      files.delete(key);
    },
    list: async (prefix) =>
      [...files]
        .filter(([key]) => key.startsWith(prefix))
        .map(([key, bytes]) => ({ key, size: bytes.length })),
    check: async () => undefined,
    close: () => undefined,
  };
}
