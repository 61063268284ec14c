import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';

describe('a database from the template', () => {
  let database: TestDatabase;
  beforeAll(async () => {
    database = await createTestDatabase();
  });
  afterAll(() => database.drop());

  it('is migrated, empty, and open to each role on its own connection', async () => {
    const databases = await database.databases();
    for (const role of ['masked', 'board', 'open'] as const) {
      const [row] = await databases[role].query('SELECT current_user AS name');
      expect(row).toEqual({ name: `${database.roles.rolePrefix}_${role}` });
    }
    expect(await database.query('SELECT count(*)::int AS n FROM study')).toEqual([{ n: 0 }]);
  });

  it('keeps sealed rows from the masked role also in a copy', async () => {
    const { masked } = await database.databases();
    await expect(masked.query('SELECT * FROM sealed.allocation')).rejects.toMatchObject({
      code: '42501',
    });
  });

  it('is apart from another', async () => {
    const other = await createTestDatabase();
    await database.query(
      "INSERT INTO audit.chain (name, head_seq, head_hash) VALUES ('x', 0, repeat('0', 64))",
    );
    expect(await other.query("SELECT name FROM audit.chain WHERE name = 'x'")).toEqual([]);
    await other.drop();
  });
});
