/** Analysis records: read by analyst and owner, signed by the analyst. */
import { PASSWORD } from '../people.ts';
import { below, newRecord, sharedRecord } from './analysis-ground.ts';
import type { MatrixRow } from './row.ts';

export const recordRows: MatrixRow[] = [
  {
    route: 'GET /api/studies/{study}/records',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({ path: below(world, '/records?signed=no&sort=by') }),
  },
  {
    route: 'GET /api/studies/{study}/records/{record}',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({
      path: below(world, `/records/${(await sharedRecord(world)).id}`),
    }),
  },
  {
    route: 'GET /api/studies/{study}/records/{record}/file',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({
      path: below(world, `/records/${(await sharedRecord(world)).id}/file`),
    }),
  },
  {
    route: 'POST /api/studies/{study}/records/{record}/signatures',
    may: ['analyst'],
    status: 201,
    prepare: async (world) => {
      const { id, contentSha256 } = await newRecord(world);
      return {
        path: below(world, `/records/${id}/signatures`),
        body: { password: PASSWORD, meaning: 'I ran this analysis', contentSha256 },
      };
    },
    stored: (world) => world.query('SELECT uid, entity_uid, account_id FROM signature ORDER BY id'),
  },
];
