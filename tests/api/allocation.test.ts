import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type AllocationRow, enterAllocation } from '../../api/features/allocation/service.ts';
import { enrolSubject } from '../../api/features/subjects/service.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { makeSmallStudy, type SmallStudy } from './subjects-study.ts';

const ARMS = ['Walking in pairs', 'Walking alone'] as const;
const CODES = Array.from({ length: 60 }, (_, at) => `N${String(at + 1).padStart(3, '0')}`);

let database: TestDatabase;
let masked: SmallStudy;
let open: SmallStudy;

beforeAll(async () => {
  database = await createTestDatabase();
  masked = await makeSmallStudy(database);
  open = await makeSmallStudy(database, { shortName: 'open', masked: false });
  for (const study of [masked, open]) {
    await study.act('owner', async (act) => {
      for (const code of CODES) {
        await enrolSubject(act, {
          siteCode: 'NOR',
          code,
          state: 'enrolled',
          consentVersion: '1',
          consentDate: '2026-10-01',
          enrolmentDate: '2026-10-01',
          baselineDate: '2026-10-01',
        });
      }
    });
  }
});
afterAll(() => database.drop());

const list = (codes: readonly string[]): AllocationRow[] =>
  codes.map((subjectCode, at) => ({ subjectCode, armName: ARMS[at % 2] ?? ARMS[0] }));
const sealedRows = () =>
  database.query<{ id: string; subject_id: string; listed_at: Date; at: string }>(
    'SELECT id, subject_id, listed_at, ctid::text AS at FROM sealed.allocation ORDER BY ctid',
  );
const refused = (code: string, params: object = {}) => ({ code, params });

describe('the allocation of a masked study', () => {
  it('is entered by nobody but the unblinded statistician', async () => {
    for (const role of ['owner', 'analyst', 'coordinator', 'monitor', 'board member'] as const) {
      await expect(
        masked.act(role, (act) => enterAllocation(act, list(CODES))),
        role,
      ).rejects.toMatchObject(refused('allocation_not_here'));
    }
    expect(await sealedRows()).toEqual([]);
  });

  it('is refused whole for an unknown subject or arm, or a subject twice, by number only', async () => {
    const enter = (rows: AllocationRow[]) =>
      masked.act('unblinded statistician', (act) => enterAllocation(act, rows));
    const good = list(CODES.slice(0, 3));
    const unknown = { subjectCode: 'nobody', armName: ARMS[0] };
    const noArm = { subjectCode: 'N009', armName: 'no such arm' };
    const row = (number: number) => refused('allocation_row_unknown', { row: number });
    await expect(enter([...good, unknown])).rejects.toMatchObject(row(4));
    await expect(enter([...good, noArm])).rejects.toMatchObject(row(4));
    await expect(enter([...good, ...list(['N002'])])).rejects.toMatchObject(
      refused('allocation_twice', { row: 4 }),
    );
    expect(await sealedRows()).toEqual([]);
  });

  it('is kept in shuffled order, under random keys and at one time', async () => {
    const entered = await masked.act('unblinded statistician', (act) =>
      enterAllocation(act, list(CODES)),
    );
    expect(entered).toBe(60);
    const rows = await sealedRows();
    const order = rows.map((row) => Number(row.subject_id));
    expect(order).not.toEqual([...order].sort((a, b) => a - b));
    expect(new Set(rows.map((row) => row.listed_at.toISOString())).size).toBe(1);
    for (const { id } of rows) {
      expect(id).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-4/);
    }
    const byKey = [...rows].sort((a, b) => (a.id < b.id ? -1 : 1)).map((row) => row.subject_id);
    expect(byKey).not.toEqual(rows.map((row) => row.subject_id));
  });

  it('has a code for each arm, drawn once, that tells nothing of it', async () => {
    const keys = () =>
      database.query<{ code: string; arm: string }>(
        'SELECT k.code, a.name AS arm FROM sealed.code_key k JOIN arm a ON a.id = k.arm_id ORDER BY a.id',
      );
    const drawn = await keys();
    expect(drawn.map((key) => key.arm)).toEqual([...ARMS]);
    for (const { code } of drawn) {
      expect(code).toMatch(/^[CDFGHJKMNPRTVWX]{2}$/);
    }
    // A later list meets the same key.
    await masked.act('owner', (act) =>
      enrolSubject(act, {
        siteCode: 'SOU',
        code: 'S001',
        state: 'enrolled',
        consentVersion: '1',
        consentDate: '2026-11-01',
        enrolmentDate: '2026-11-01',
        baselineDate: null,
      }),
    );
    await masked.act('unblinded statistician', (act) => enterAllocation(act, list(['S001'])));
    expect(await keys()).toEqual(drawn);
  });

  it('leaves no pair of subject and arm in the trail', async () => {
    const entries = await database.query<{ body: string; action: string }>(
      `SELECT action, body FROM audit.entry WHERE chain = $1 AND action IN ('sealed allocation entered', 'codes drawn')`,
      [masked.uid],
    );
    expect(entries.length).toBe(3);
    const codes = await database.query<{ code: string }>('SELECT code FROM sealed.code_key');
    for (const { body } of entries) {
      expect(body).not.toMatch(/Walking|N0\d\d/);
      expect(codes.some(({ code }) => body.includes(`"${code}"`))).toBe(false);
    }
  });

  it('can’t stand in the open', async () => {
    const [row] = await database.query<{ n: number }>(
      'SELECT count(*)::int AS n FROM open_arm WHERE study_id = $1',
      [masked.id],
    );
    expect(row?.n).toBe(0);
  });
});

describe('the arms of a study that is not masked', () => {
  it('stand in the open, entered by its owner, and nothing is sealed', async () => {
    const before = await sealedRows();
    await open.act('owner', (act) => enterAllocation(act, list(CODES)));
    const rows = await database.query(
      `SELECT a.name, count(*)::int AS n FROM open_arm o JOIN arm a ON a.id = o.arm_id
        WHERE o.study_id = $1 GROUP BY a.name ORDER BY a.name`,
      [open.id],
    );
    expect(rows).toEqual([
      { name: 'Walking alone', n: 30 },
      { name: 'Walking in pairs', n: 30 },
    ]);
    expect(await sealedRows()).toEqual(before);
    await expect(
      open.act('owner', (act) => enterAllocation(act, list(['N001']))),
    ).rejects.toMatchObject(refused('allocation_twice', { row: 1 }));
  });
});
