/** Subjects and the set-up of a study: read by those who may, changed by no route of theirs. */
import { enrolSubject } from '../../../api/features/subjects/service.ts';
import { actInStudy } from '../../../api/features/subjects/study-act.ts';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const READERS = ['owner', 'monitor', 'coordinator'] as const;

/** A subject at the coordinator's site, entered by the coordinator. */
const subjectUid = (world: World): Promise<string> =>
  world.once('subjects: one', async () => {
    const { coordinator } = world.people;
    const subject = await actInStudy(
      {
        db: world.app.deps.databases.masked,
        actor: {
          accountId: coordinator.id,
          accountUid: coordinator.uid,
          name: coordinator.name,
          role: 'coordinator',
          sessionUid: null,
          requestId: null,
        },
        clock: world.app.deps.clock,
        studyUid: world.study.uid,
        siteIds: null,
      },
      (act) =>
        enrolSubject(act, {
          siteCode: 'elm',
          code: 'E-001',
          state: 'enrolled',
          consentVersion: '1',
          consentDate: '2026-11-01',
          enrolmentDate: '2026-11-01',
          baselineDate: '2026-11-02',
        }),
    );
    return subject.uid;
  });

const get = (route: string, path: (world: World) => Promise<string> | string): MatrixRow => ({
  route: `GET /api/studies/{study}${route}`,
  may: READERS,
  status: 200,
  prepare: async (world) => ({ path: `/api/studies/${world.study.uid}${await path(world)}` }),
});

export const subjectRows: MatrixRow[] = [
  get('/subjects', () => '/subjects?site=elm&sort=lastVisit&direction=desc'),
  {
    ...get('/subjects.csv', () => '/subjects.csv?state=enrolled'),
    stored: (world) =>
      world.query(`SELECT seq FROM audit.entry WHERE action = 'subject list downloaded'`),
  },
  get('/subjects/{subject}', async (world) => `/subjects/${await subjectUid(world)}`),
  get('/find', async (world) => {
    await subjectUid(world);
    return '/find?code=E-0';
  }),
  { ...get('/setup', () => '/setup'), may: ['owner'] },
];
