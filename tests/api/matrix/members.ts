/** The people of a study and its set-up: the owner's. */
import { giveRole } from '../people.ts';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const membersStored = (world: World) =>
  world.query('SELECT uid, account_id, role, removed_at, version FROM membership ORDER BY id');

async function newMember(world: World): Promise<string> {
  const person = await world.newPerson();
  await giveRole(world.app.database, world.study.id, person, 'monitor');
  return `/api/studies/${world.study.uid}/members/${person.uid}`;
}

export const memberRows: MatrixRow[] = [
  {
    route: 'GET /api/studies/{study}/members',
    may: ['owner'],
    status: 200,
    prepare: async (world) => ({ path: `/api/studies/${world.study.uid}/members?sort=role` }),
  },
  {
    route: 'POST /api/studies/{study}/members',
    may: ['owner'],
    status: 201,
    prepare: async (world) => ({
      path: `/api/studies/${world.study.uid}/members`,
      body: {
        email: (await world.newPerson()).email,
        roles: ['analyst'],
        chair: false,
        siteIds: [],
      },
    }),
    stored: membersStored,
  },
  {
    route: 'PATCH /api/studies/{study}/members/{member}',
    may: ['owner'],
    status: 200,
    prepare: async (world) => ({
      path: await newMember(world),
      body: { roles: ['analyst', 'monitor'], chair: false, siteIds: [], version: 1 },
    }),
    stored: membersStored,
  },
  {
    route: 'POST /api/studies/{study}/members/{member}/remove',
    may: ['owner'],
    status: 204,
    prepare: async (world) => ({
      path: `${await newMember(world)}/remove`,
      body: { version: 1, reason: 'left the team' },
    }),
    stored: membersStored,
  },
];
