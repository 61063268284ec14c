import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Databases, ownerDataSource } from '../../database/data-source.ts';
import { SealedAllocation } from '../../database/entities/sealed/index.ts';
import { CreateRoleMissing, migrate } from '../../database/migrate.ts';
import { RECORD_RIGHTS } from '../../database/rights.ts';
import { roleName } from '../../database/role-names.ts';
import { scramVerifier } from '../../database/roles.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';

let database: TestDatabase;
let databases: Databases;

beforeAll(async () => {
  database = await createTestDatabase();
  databases = await database.databases();
});
afterAll(() => database.drop());

const denied = { code: '42501' };
const neverChanges = { code: '55000' };

describe('rights', () => {
  it('are written down for every table of records, and for no other', async () => {
    const tables = await database.query<{ name: string }>(
      `SELECT tablename AS name FROM pg_tables WHERE schemaname = 'public' AND tablename <> 'schema_migration'`,
    );
    expect(tables.map((table) => table.name).sort()).toEqual(Object.keys(RECORD_RIGHTS).sort());
  });

  it.each(['masked', 'board'] as const)('keep sealed rows from the %s role', async (role) => {
    for (const table of ['allocation', 'code_key']) {
      await expect(databases[role].query(`SELECT * FROM sealed.${table}`)).rejects.toMatchObject(
        denied,
      );
    }
    expect(() => databases[role].getRepository(SealedAllocation).metadata).toThrow(/No metadata/);
  });

  it('let the open role read and add sealed rows, and change none', async () => {
    expect(await databases.open.query('SELECT * FROM sealed.allocation')).toEqual([]);
    for (const statement of [
      'UPDATE sealed.allocation SET arm_id = 1',
      'DELETE FROM sealed.code_key',
    ]) {
      await expect(databases.open.query(statement)).rejects.toMatchObject(denied);
    }
  });

  it('open what is released to the board and the statistician, also in a table made later', async () => {
    await database.query('CREATE TABLE released.later (id uuid PRIMARY KEY)');
    expect(await databases.board.query('SELECT * FROM released.later')).toEqual([]);
    expect(await databases.open.query('SELECT * FROM released.later')).toEqual([]);
    await expect(databases.masked.query('SELECT * FROM released.later')).rejects.toMatchObject(
      denied,
    );
    await expect(
      databases.board.query('INSERT INTO released.later VALUES (gen_random_uuid())'),
    ).rejects.toMatchObject(denied);
  });

  it('let no role delete a record, write the trail or take another role', async () => {
    const statements = [
      'DELETE FROM reading',
      'DELETE FROM subject',
      'TRUNCATE visit',
      'UPDATE cut SET name = name',
      'DELETE FROM analysis_record',
      'UPDATE check_opening SET result = result',
      'UPDATE reading_revision SET reason = reason',
      `INSERT INTO audit.chain VALUES ('x', 0, repeat('0', 64))`,
      'UPDATE audit.entry SET action = action',
      'DELETE FROM audit.entry',
      'TRUNCATE audit.entry',
      'CREATE TABLE public.mine (id int)',
      `SET ROLE ${roleName(database.roles.rolePrefix, 'open')}`,
    ];
    for (const statement of statements) {
      await expect(databases.masked.query(statement), statement).rejects.toMatchObject(denied);
    }
  });
});

describe('the schema', () => {
  it('makes keys of version 7 that hold the time', async () => {
    const [made] = await database.query<{ uid: string; ms: string }>(
      `SELECT uuid_v7()::text AS uid, (extract(epoch FROM clock_timestamp()) * 1000)::bigint AS ms`,
    );
    expect(made?.uid).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-/);
    const held = Number.parseInt((made?.uid ?? '').replaceAll('-', '').slice(0, 12), 16);
    expect(Math.abs(held - Number(made?.ms))).toBeLessThan(1000);
  });

  it('holds no name, birth date or arm of a subject', async () => {
    const columns = await database.query<{ name: string }>(
      `SELECT column_name AS name FROM information_schema.columns
        WHERE table_schema = 'public' AND table_name = 'subject'`,
    );
    const names = columns.map((column) => column.name);
    expect(names.filter((name) => /name|birth|arm|email|phone|address/.test(name))).toEqual([]);
  });

  it('refuses an arm in the open for a masked study', async () => {
    const [study] = await database.query<{ id: string }>(
      `INSERT INTO study (name, short_name, masked, created_at) VALUES ('M', 'masked-1', true, now()) RETURNING id`,
    );
    const [person] = await database.query<{ id: string }>(
      `INSERT INTO account (email, name, password_hash, created_at) VALUES ('p@x.example', 'P', 'x', now()) RETURNING id`,
    );
    const [site] = await database.query<{ id: string }>(
      `INSERT INTO site (study_id, code, name, time_zone) VALUES ($1, 'A', 'A', 'UTC') RETURNING id`,
      [study?.id],
    );
    const [arm] = await database.query<{ id: string }>(
      `INSERT INTO arm (study_id, name, position) VALUES ($1, 'one', 1) RETURNING id`,
      [study?.id],
    );
    const [subject] = await database.query<{ id: string }>(
      `INSERT INTO subject (study_id, site_id, code, state, created_at, created_by)
       VALUES ($1, $2, 'S1', 'screening', now(), $3) RETURNING id`,
      [study?.id, site?.id, person?.id],
    );
    const insert = (masked: boolean) =>
      database.query(
        'INSERT INTO open_arm (subject_id, study_id, masked, arm_id) VALUES ($1, $2, $3, $4)',
        [subject?.id, study?.id, masked, arm?.id],
      );
    await expect(insert(false)).rejects.toMatchObject({ code: '23503' });
    await expect(insert(true)).rejects.toMatchObject({ code: '23514' });
  });

  it('refuses duties that exclude each other, whoever writes', async () => {
    const [study] = await database.query<{ id: string }>(
      `INSERT INTO study (name, short_name, masked, created_at) VALUES ('D', 'duties', true, now()) RETURNING id`,
    );
    const account = async (email: string, administrator: boolean) => {
      const [row] = await database.query<{ id: string }>(
        `INSERT INTO account (email, name, password_hash, administrator, created_at)
         VALUES ($1, 'P', 'x', $2, now()) RETURNING id`,
        [email, administrator],
      );
      return row?.id;
    };
    const member = (accountId: string | undefined, role: string) =>
      databases.masked.query(
        `INSERT INTO membership (study_id, account_id, role, created_at) VALUES ($1, $2, $3, now())`,
        [study?.id, accountId, role],
      );
    const refused = { code: '23514', driverError: { constraint: 'membership_duties' } };

    const analyst = await account('analyst@x.example', false);
    await member(analyst, 'analyst');
    await member(analyst, 'coordinator');
    await expect(member(analyst, 'board member')).rejects.toMatchObject(refused);
    await expect(member(analyst, 'unblinded statistician')).rejects.toMatchObject(refused);
    await expect(
      databases.masked.query('UPDATE account SET administrator = true WHERE id = $1', [analyst]),
    ).rejects.toMatchObject(refused);

    const statistician = await account('statistician@x.example', false);
    await member(statistician, 'unblinded statistician');
    await expect(member(statistician, 'monitor')).rejects.toMatchObject(refused);
    await databases.masked.query('UPDATE membership SET removed_at = now() WHERE account_id = $1', [
      statistician,
    ]);
    await member(statistician, 'monitor');

    const administrator = await account('administrator@x.example', true);
    await expect(member(administrator, 'owner')).rejects.toMatchObject(refused);
  });

  it('never changes a cut, also not for the owner of the database', async () => {
    const [account] = await database.query<{ id: string }>(
      `INSERT INTO account (email, name, password_hash, created_at) VALUES ('c@x.example', 'C', 'x', now()) RETURNING id`,
    );
    const [study] = await database.query<{ id: string }>(
      `INSERT INTO study (name, short_name, masked, created_at) VALUES ('C', 'cuts', false, now()) RETURNING id`,
    );
    await database.query(
      `INSERT INTO cut (study_id, number, name, measures, visit_cutoff, entered_until, frozen_by, frozen_at,
         exclusions, withdrawn_left_out, row_count, subject_count, reading_count, late_count, pending_count,
         late_rows, pending_rows, ended, groups, sha256)
       VALUES ($1, 1, 'one', '[]', '2026-01-01', now(), $2, now(), '[]', '{}', 0, 0, 0, 0, 0, '[]', '[]', '[]',
         '[]', repeat('a', 64))`,
      [study?.id, account?.id],
    );
    for (const statement of [
      'UPDATE cut SET name = name',
      'DELETE FROM cut',
      'TRUNCATE cut CASCADE',
    ]) {
      await expect(database.query(statement), statement).rejects.toMatchObject(neverChanges);
    }
  });
});

describe('migrating', () => {
  it('goes down to nothing and up again', async () => {
    const copy = await createTestDatabase();
    const source = ownerDataSource(copy.ownerUrl);
    await source.initialize();
    const steps = await copy.query('SELECT name FROM schema_migration');
    for (const _step of steps) {
      await source.undoLastMigration({ transaction: 'all' });
    }
    await source.destroy();
    const left = await copy.query<{ name: string }>(
      `SELECT tablename AS name FROM pg_tables WHERE schemaname IN ('public', 'audit', 'sealed', 'released')`,
    );
    expect(left).toEqual([{ name: 'schema_migration' }]);
    expect(await migrate(copy.ownerUrl, copy.roles)).toHaveLength(steps.length);
    expect(await migrate(copy.ownerUrl, copy.roles)).toEqual([]);
    await copy.drop();
  });

  it('prints statements that make the roles where its user may not', async () => {
    const copy = await createTestDatabase();
    await copy.query(`CREATE ROLE plain_${copy.name} LOGIN PASSWORD 'plain'`);
    const url = new URL(copy.ownerUrl);
    url.username = `plain_${copy.name}`;
    url.password = 'plain';
    const roles = { ...copy.roles, rolePrefix: `n_${copy.name.slice(-12)}` };
    const refusal = await migrate(url.toString(), roles).then(
      () => null,
      (error: unknown) => error,
    );
    expect(refusal).toBeInstanceOf(CreateRoleMissing);
    const { sql } = refusal as CreateRoleMissing;
    expect(sql).not.toContain(copy.roles.passwords.masked);
    // What was printed works: run by someone who may, the role takes the password.
    await copy.query(sql);
    const login = new URL(copy.ownerUrl);
    login.username = roleName(roles.rolePrefix, 'masked');
    login.password = encodeURIComponent(copy.roles.passwords.masked);
    const client = new pg.Client({ connectionString: login.toString() });
    await client.connect();
    await client.end();
    for (const role of ['masked', 'board', 'open'] as const) {
      await copy.query(`DROP ROLE ${roleName(roles.rolePrefix, role)}`);
    }
    await copy.query(`DROP ROLE plain_${copy.name}`);
    await copy.drop();
  });

  it('writes a password as PostgreSQL keeps it', () => {
    // The worked example of RFC 7677: user "user", password "pencil", this salt, 4096 rounds.
    const verifier = scramVerifier('pencil', Buffer.from('W22ZaJ0SNY7soEsUEjb6gQ==', 'base64'));
    expect(verifier).toBe(
      'SCRAM-SHA-256$4096:W22ZaJ0SNY7soEsUEjb6gQ==$WG5d8oPm3OtcPnkdi4Uo7BkeZkBFzpcXkuLmtbsT4qY=:wfPLwcE6nTWhTAmQ7tl2KeoiWGPlZqQxSrmfPwDl2dU=',
    );
  });
});
