/** Signing in and out, and the own account. Each person may; what they reach is their own. */
import { studyRoles } from '../../../api/contracts/common.ts';
import { PASSWORD } from '../people.ts';
import type { MatrixRow, Who } from './row.ts';
import type { World } from './world.ts';

const still = (path: string) => async () => ({ path });

const mine = (who: Who | null) => (who === null || who === 'anonymous' ? 'monitor' : who);

async function ownAccount(world: World, who: Who | null): Promise<{ version: number }> {
  const [row] = await world.query<{ version: number }>(
    'SELECT version FROM account WHERE uid = $1',
    [world.people[mine(who)].uid],
  );
  return { version: row?.version ?? 0 };
}

/** One more session of a person; ended or listed without harm to the one that tries. */
async function spareSession(world: World, who: Who | null): Promise<string> {
  const { email, id } = world.people[mine(who)];
  await world.app.signedIn(email, PASSWORD);
  const [row] = await world.query<{ uid: string }>(
    'SELECT uid FROM session WHERE account_id = $1 AND revoked_at IS NULL ORDER BY id DESC LIMIT 1',
    [id],
  );
  return row?.uid ?? '';
}

export const sessionRows: MatrixRow[] = [
  { route: 'GET /healthz', may: ['public'], status: 200, prepare: still('/healthz') },
  { route: 'GET /metrics', may: ['public'], status: 200, prepare: still('/metrics') },
  { route: 'GET /readyz', may: ['public'], status: 200, prepare: still('/readyz') },
  {
    route: 'GET /api/openapi.json',
    may: ['public'],
    status: 200,
    prepare: still('/api/openapi.json'),
  },
  { route: 'GET /api/docs', may: ['public'], status: 200, prepare: still('/api/docs') },
  {
    // The sign-in itself is tried in auth.test.ts; here, that the door is open to everybody.
    route: 'POST /api/sign-in',
    may: ['public'],
    status: 401,
    prepare: async () => ({
      path: '/api/sign-in',
      body: { email: 'nobody@nowhere.example', password: 'wrong' },
    }),
  },
  {
    route: 'POST /api/refresh',
    may: ['public'],
    // Whoever is signed in here holds a refresh cookie; the others have none to trade.
    status: (who) => (who === 'anonymous' ? 401 : 200),
    prepare: still('/api/refresh'),
    stored: (world) => world.query('SELECT id, used_at FROM refresh_token ORDER BY id'),
  },
  { route: 'GET /api/me', may: ['signed in'], status: 200, prepare: still('/api/me') },
  {
    route: 'PATCH /api/me',
    may: ['signed in'],
    status: 200,
    prepare: async (world, who) => ({
      path: '/api/me',
      body: { timeZone: 'Europe/Zurich', ...(await ownAccount(world, who)) },
    }),
    stored: (world) => world.query('SELECT uid, time_zone, version FROM account ORDER BY id'),
  },
  {
    route: 'GET /api/me/sessions',
    may: ['signed in'],
    status: 200,
    prepare: still('/api/me/sessions'),
  },
  {
    route: 'DELETE /api/me/sessions/{session}',
    may: ['signed in'],
    own: true,
    status: 204,
    prepare: async (world, who) => ({ path: `/api/me/sessions/${await spareSession(world, who)}` }),
    stored: (world) => world.query('SELECT uid, revoked_at FROM session ORDER BY id'),
  },
  {
    route: 'GET /api/studies/{study}',
    may: studyRoles,
    status: 200,
    prepare: async (world) => ({ path: `/api/studies/${world.study.uid}` }),
  },
];

/** These end sessions and change passwords that the other rows use, so they come after all of them. */
export const lastRows: MatrixRow[] = [
  {
    route: 'POST /api/me/password',
    may: ['signed in'],
    status: 204,
    prepare: async () => ({
      path: '/api/me/password',
      body: { currentPassword: PASSWORD, newPassword: `${PASSWORD} b` },
    }),
    stored: (world) => world.query('SELECT uid, password_hash FROM account ORDER BY id'),
  },
  {
    route: 'POST /api/sign-out',
    may: ['signed in'],
    status: 204,
    prepare: still('/api/sign-out'),
    stored: (world) => world.query('SELECT uid, revoked_at FROM session ORDER BY id'),
  },
];
