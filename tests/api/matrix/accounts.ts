/** Accounts and the security log: the administrator's alone. */
import { randomUUID } from 'node:crypto';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const accountsStored = (world: World) =>
  world.query('SELECT uid, email, disabled_at, password_hash, version FROM account ORDER BY id');

const act = (verb: 'disable' | 'enable' | 'reset'): MatrixRow => ({
  route: `POST /api/accounts/{account}/${verb}`,
  may: ['administrator'],
  status: 200,
  prepare: async (world) => {
    const person = await world.newPerson();
    if (verb === 'enable') {
      await world.query('UPDATE account SET disabled_at = now() WHERE id = $1', [person.id]);
    }
    return {
      path: `/api/accounts/${person.uid}/${verb}`,
      body: { version: 1, reason: 'asked for by the person' },
    };
  },
  stored: accountsStored,
});

export const accountRows: MatrixRow[] = [
  {
    route: 'GET /api/accounts',
    may: ['administrator'],
    status: 200,
    prepare: async () => ({ path: '/api/accounts?text=the&sort=lastSeenAt&direction=desc' }),
  },
  {
    route: 'POST /api/accounts',
    may: ['administrator'],
    status: 201,
    prepare: async () => ({
      path: '/api/accounts',
      body: { email: `${randomUUID()}@new.example`, name: 'New Person', administrator: false },
    }),
    stored: accountsStored,
  },
  act('disable'),
  act('enable'),
  act('reset'),
  {
    route: 'GET /api/security-log',
    may: ['administrator'],
    status: 200,
    prepare: async () => ({ path: '/api/security-log?pageSize=5' }),
  },
  {
    route: 'GET /api/security-log.csv',
    may: ['administrator'],
    status: 200,
    prepare: async () => ({ path: '/api/security-log.csv' }),
  },
];
