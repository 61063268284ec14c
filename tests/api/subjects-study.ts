/** A small study of two sites with its people, made through the services. */
import type { Actor } from '../../api/audit/actor.ts';
import { inTransaction } from '../../api/audit/transaction.ts';
import { hashPassword } from '../../api/auth/passwords.ts';
import { type SetupFileInput, setupFileSchema } from '../../api/contracts/setup.ts';
import { createStudyFromSetup } from '../../api/features/setup/service.ts';
import { actInStudy, type StudyAct } from '../../api/features/subjects/study-act.ts';
import type { Databases } from '../../database/data-source.ts';
import type { StudyRole } from '../../database/entities/index.ts';
import type { TestDatabase } from '../support/test-database.ts';

export const PASSWORD = 'three herons on a wire';
export const NOW = new Date('2026-12-01T12:00:00.000Z');

export const SETUP: SetupFileInput = {
  format: 'tetherline-setup/1',
  study: { name: 'Marsh walk study', shortName: 'marsh', masked: true },
  sites: [
    { code: 'NOR', name: 'North hall', timeZone: 'Europe/London' },
    { code: 'SOU', name: 'South hall', timeZone: 'Pacific/Auckland' },
  ],
  arms: ['Walking in pairs', 'Walking alone'],
  measures: [
    {
      shortName: 'sway',
      label: 'Sway path',
      unit: 'cm',
      decimals: 1,
      nature: 'positive',
      plausibleLow: 20,
      plausibleHigh: 200,
      impossibleLow: 1,
      impossibleHigh: 900,
    },
    { shortName: 'falls', label: 'Falls', nature: 'count' },
    {
      shortName: 'sex',
      label: 'Sex',
      nature: 'choice',
      per: 'subject',
      choices: [
        { code: 'f', label: 'female' },
        { code: 'm', label: 'male' },
      ],
    },
  ],
  visits: [
    { name: 'Baseline', targetDay: 0, windowAfter: 3 },
    { name: 'Week 4', targetDay: 28, windowBefore: 5, windowAfter: 5 },
    { name: 'Week 8', targetDay: 56, windowBefore: 5, windowAfter: 5 },
  ],
};

export interface SmallStudy {
  id: string;
  uid: string;
  siteIds: Record<'NOR' | 'SOU', string>;
  /** The injected clock: tests move it. */
  clock: { now: Date };
  actor(role: StudyRole): Actor;
  /** As this role, over the database of that role. */
  act<T>(
    role: StudyRole,
    work: (act: StudyAct) => Promise<T>,
    siteIds?: readonly string[] | null,
  ): Promise<T>;
}

export const emailOf = (role: string, shortName = 'marsh'): string =>
  `${role.replaceAll(' ', '-')}@${shortName}.example`;

/** The coordinator works at the north hall only. */
export async function makeSmallStudy(
  database: TestDatabase,
  over: Partial<SetupFileInput['study']> = {},
): Promise<SmallStudy> {
  const databases = await database.databases();
  const setup = setupFileSchema.parse({ ...SETUP, study: { ...SETUP.study, ...over } });
  const study = await inTransaction(databases.masked, null, (tx) =>
    createStudyFromSetup(tx, NOW, setup),
  );
  const sites = await database.query<{ id: string; code: string }>(
    'SELECT id, code FROM site WHERE study_id = $1',
    [study.id],
  );
  const siteId = (code: string) => sites.find((site) => site.code === code)?.id ?? '';
  const siteIds = { NOR: siteId('NOR'), SOU: siteId('SOU') };
  const actors = await addPeople(database, study.id, study.shortName, siteIds.NOR);
  const clock = { now: NOW };
  const actor = (role: StudyRole): Actor => {
    const found = actors.get(role);
    if (!found) {
      throw new Error(`nobody is ${role}`);
    }
    return found;
  };
  return {
    id: study.id,
    uid: study.uid,
    siteIds,
    clock,
    actor,
    act: (role, work, reach = role === 'coordinator' ? [siteIds.NOR] : null) =>
      actInStudy(
        {
          db: databaseOf(databases, role),
          actor: actor(role),
          clock: () => clock.now,
          studyUid: study.uid,
          siteIds: reach,
        },
        work,
      ),
  };
}

function databaseOf(databases: Databases, role: StudyRole) {
  if (role === 'unblinded statistician') {
    return databases.open;
  }
  return role === 'board member' ? databases.board : databases.masked;
}

const ROLES: StudyRole[] = [
  'owner',
  'coordinator',
  'monitor',
  'analyst',
  'unblinded statistician',
  'board member',
  'safety officer',
];

async function addPeople(
  database: TestDatabase,
  studyId: string,
  shortName: string,
  coordinatorsSite: string,
): Promise<Map<StudyRole, Actor>> {
  const hash = await hashPassword(PASSWORD);
  const actors = new Map<StudyRole, Actor>();
  for (const role of ROLES) {
    const [account] = await database.query<{ id: string; uid: string }>(
      `INSERT INTO account (email, name, password_hash, created_at) VALUES ($1, $2, $3, '2026-01-01')
       RETURNING id, uid`,
      [emailOf(role, shortName), `Kit ${role}`, hash],
    );
    const [membership] = await database.query<{ id: string }>(
      `INSERT INTO membership (study_id, account_id, role, created_at) VALUES ($1, $2, $3, '2026-01-01')
       RETURNING id`,
      [studyId, account?.id, role],
    );
    if (role === 'coordinator') {
      await database.query('INSERT INTO membership_site VALUES ($1, $2)', [
        membership?.id,
        coordinatorsSite,
      ]);
    }
    actors.set(role, {
      accountId: account?.id ?? '',
      accountUid: account?.uid ?? '',
      name: `Kit ${role}`,
      role,
      sessionUid: null,
      requestId: null,
    });
  }
  return actors;
}
