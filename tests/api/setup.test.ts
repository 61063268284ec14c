import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { setupViewSchema } from '../../api/contracts/setup.ts';
import { type FirstOwnerInput, makeFirstOwner } from '../../api/features/setup/first-owner.ts';
import { readSetupFile } from '../../api/features/setup/read-file.ts';
import { readSetup } from '../../api/features/setup/service.ts';
import type { Problem } from '../../api/http/problems.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { SETUP } from './subjects-study.ts';

const clone = (): Record<string, never> => JSON.parse(JSON.stringify(SETUP));

/** The set-up with one place changed; the faults told of it. */
function faultsOf(change: (setup: typeof SETUP) => void): { path: string; message: string }[] {
  const setup = clone() as unknown as typeof SETUP;
  change(setup);
  return faultsOfText(JSON.stringify(setup));
}
function faultsOfText(text: string): { path: string; message: string }[] {
  try {
    readSetupFile(text);
  } catch (error) {
    return [...(error as Problem).errors];
  }
  return [];
}

describe('a set-up file', () => {
  it('is read, with a mark of byte order too', () => {
    expect(readSetupFile(`\uFEFF${JSON.stringify(SETUP)}`).measures[0]).toMatchObject({
      shortName: 'sway',
      per: 'visit',
      alertHigh: null,
    });
  });

  it.each<[string, (setup: typeof SETUP) => void, string]>([
    ['format', (s) => Object.assign(s, { format: 'other/1' }), 'format'],
    ['unknown key', (s) => Object.assign(s.study, { colour: 'red' }), 'study'],
    ['no site', (s) => Object.assign(s, { sites: [] }), 'sites'],
    [
      'zone',
      (s) => Object.assign(s.sites[0] ?? {}, { timeZone: 'Fens/Cambridge' }),
      'sites.0.timeZone',
    ],
    ['site code', (s) => Object.assign(s.sites[0] ?? {}, { code: '=1+1' }), 'sites.0.code'],
    ['site twice', (s) => Object.assign(s.sites[1] ?? {}, { code: 'NOR' }), 'sites.1.code'],
    ['arm twice', (s) => Object.assign(s, { arms: ['a', 'a'] }), 'arms.1'],
    [
      'reserved',
      (s) => Object.assign(s.measures[0] ?? {}, { shortName: 'planned_day' }),
      'measures.0.shortName',
    ],
    [
      'note',
      (s) => Object.assign(s.measures[0] ?? {}, { shortName: 'sway_note' }),
      'measures.0.shortName',
    ],
    [
      'capital',
      (s) => Object.assign(s.measures[0] ?? {}, { shortName: 'Sway' }),
      'measures.0.shortName',
    ],
    [
      'range',
      (s) => Object.assign(s.measures[0] ?? {}, { plausibleHigh: 10 }),
      'measures.0.plausibleHigh',
    ],
    [
      'outside',
      (s) => Object.assign(s.measures[0] ?? {}, { plausibleHigh: 1000 }),
      'measures.0.plausibleHigh',
    ],
    [
      'no choices',
      (s) => Object.assign(s.measures[2] ?? {}, { choices: null }),
      'measures.2.choices',
    ],
    [
      'choices',
      (s) => Object.assign(s.measures[1] ?? {}, { choices: s.measures[2]?.choices }),
      'measures.1.choices',
    ],
    [
      'visit name',
      (s) => Object.assign(s.visits[1] ?? {}, { name: 'unscheduled' }),
      'visits.1.name',
    ],
    ['formula visit', (s) => Object.assign(s.visits[1] ?? {}, { name: '@week' }), 'visits.1.name'],
    [
      'two-line visit',
      (s) => Object.assign(s.visits[1] ?? {}, { name: 'Week\n4' }),
      'visits.1.name',
    ],
    ['formula arm', (s) => Object.assign(s, { arms: ['a', '=b'] }), 'arms.1'],
    ['arm that says missing', (s) => Object.assign(s, { arms: ['a', 'N/A'] }), 'arms.1'],
    [
      'site that says missing',
      (s) => Object.assign(s.sites[0] ?? {}, { code: 'NA' }),
      'sites.0.code',
    ],
    ['same day', (s) => Object.assign(s.visits[1] ?? {}, { targetDay: 0 }), 'visits.1.targetDay'],
    [
      'half a day',
      (s) => Object.assign(s.visits[1] ?? {}, { targetDay: 0.5 }),
      'visits.1.targetDay',
    ],
  ])('is refused with its place and a mend: %s', (_what, change, path) => {
    const faults = faultsOf(change);
    expect(faults.map((fault) => fault.path)).toContain(path);
    for (const { message } of faults) {
      expect(message.length).toBeGreaterThan(5);
    }
  });

  it.each(['', '{', '[]', 'null', '{"format":"tetherline-setup/1"'])(
    'is refused when it is %j',
    (text) => {
      expect(faultsOfText(text).length).toBeGreaterThan(0);
    },
  );
});

describe('the first owner', () => {
  let database: TestDatabase;
  beforeAll(async () => {
    database = await createTestDatabase();
  });
  afterAll(() => database.drop());

  const at = new Date('2026-12-01T12:00:00Z');
  const make = async (over: Partial<FirstOwnerInput> = {}) =>
    makeFirstOwner((await database.databases()).masked, () => at, {
      administrator: { email: 'admin@x.example', name: 'Ada', password: 'nine green bottles' },
      owner: { email: 'owner@x.example', name: 'Ola', password: 'eight maids milking' },
      setup: readSetupFile(JSON.stringify(SETUP)),
      ...over,
    });
  const counts = async () => {
    const [row] = await database.query(
      `SELECT (SELECT count(*)::int FROM account) AS accounts, (SELECT count(*)::int FROM study) AS studies,
              (SELECT count(*)::int FROM membership) AS members, (SELECT count(*)::int FROM audit.entry) AS entries`,
    );
    return row;
  };
  const owner = (over: object) => ({
    owner: { email: 'owner@x.example', name: 'Ola', password: 'eight maids milking', ...over },
  });

  it.each([
    ['first_owner_same', owner({ email: 'ADMIN@x.example' })],
    ['invalid_request', owner({ email: 'nowhere' })],
    ['invalid_request', owner({ password: 'short' })],
    ['password_common', owner({ password: 'password123' })],
  ])('is refused with %s, and nothing is made', async (code, over) => {
    await expect(make(over)).rejects.toMatchObject({ code });
    expect(await counts()).toEqual({ accounts: 0, studies: 0, members: 0, entries: 0 });
  });

  it('is made with an administrator and a study, who hold only what is theirs', async () => {
    const study = await make();
    expect(await counts()).toEqual({ accounts: 2, studies: 1, members: 1, entries: 4 });
    expect(
      await database.query(
        `SELECT a.email, a.administrator, m.role FROM account a LEFT JOIN membership m ON m.account_id = a.id ORDER BY a.id`,
      ),
    ).toEqual([
      { email: 'admin@x.example', administrator: true, role: null },
      { email: 'owner@x.example', administrator: false, role: 'owner' },
    ]);
    const trail = await database.query(
      `SELECT after FROM audit.entry WHERE action = 'account created' ORDER BY seq`,
    );
    expect(trail.map(({ after }) => after)).toEqual([
      { email: 'admin@x.example', name: 'Ada', administrator: true },
      { email: 'owner@x.example', name: 'Ola', administrator: false },
    ]);
    const view = await readSetup((await database.databases()).masked.manager, study.id);
    expect(setupViewSchema.parse(view)).toMatchObject({
      study: { shortName: 'marsh', masked: true, closingDays: 3, lateDays: 14 },
      sites: [{ code: 'NOR' }, { code: 'SOU', timeZone: 'Pacific/Auckland' }],
      arms: ['Walking in pairs', 'Walking alone'],
      measures: [
        { shortName: 'sway', impossibleHigh: 900 },
        { nature: 'count' },
        { per: 'subject' },
      ],
      visits: [{ name: 'Baseline', windowBefore: 0 }, { targetDay: 28 }, { targetDay: 56 }],
    });
  });

  it('is refused again for the same people or the same study, and nothing more is made', async () => {
    const before = await counts();
    await expect(make()).rejects.toMatchObject({
      code: 'account_exists',
      errors: [{ path: 'administrator.email', message: 'admin@x.example' }],
    });
    const others = {
      administrator: { email: 'b@x.example', name: 'B', password: 'seven swans swimming' },
      owner: { email: 'c@x.example', name: 'C', password: 'six geese laying' },
    };
    await expect(make(others)).rejects.toMatchObject({ code: 'setup_study_exists' });
    expect(await counts()).toEqual(before);
    const second = { ...SETUP, study: { ...SETUP.study, shortName: 'second' } };
    await make({ ...others, setup: readSetupFile(JSON.stringify(second)) });
  });
});
