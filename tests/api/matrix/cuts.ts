/** Cuts: read by analyst and owner, frozen by the analyst. */
import { below, freezing, frozenCut } from './analysis-ground.ts';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const cutsStored = (world: World) =>
  world.query(`SELECT cut.uid, cut.sha256, cut.number, count(cut_chunk.seq)::int AS chunks
    FROM cut JOIN cut_chunk ON cut_chunk.cut_id = cut.id GROUP BY cut.id ORDER BY cut.id`);

const downloads = (world: World) =>
  world.query(`SELECT count(*)::int AS entries FROM audit.entry WHERE action = 'cut downloaded'`);

export const cutRows: MatrixRow[] = [
  {
    route: 'GET /api/studies/{study}/cuts',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({ path: below(world, '/cuts?sort=name') }),
  },
  {
    route: 'GET /api/studies/{study}/cut-choices',
    may: ['analyst'],
    status: 200,
    prepare: async (world) => ({ path: below(world, '/cut-choices') }),
  },
  {
    route: 'GET /api/studies/{study}/cut-preview',
    may: ['analyst'],
    status: 200,
    prepare: async (world) => ({
      path: below(world, '/cut-preview?visitCutoff=2026-11-30&measures=weight'),
    }),
  },
  {
    route: 'POST /api/studies/{study}/cuts',
    may: ['analyst'],
    status: 201,
    prepare: async (world) => {
      await frozenCut(world);
      return { path: below(world, '/cuts'), body: freezing };
    },
    stored: cutsStored,
  },
  {
    route: 'GET /api/studies/{study}/cuts/{cut}',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({ path: below(world, `/cuts/${await frozenCut(world)}`) }),
  },
  {
    route: 'GET /api/studies/{study}/cuts/{cut}/difference',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => {
      const cut = await frozenCut(world);
      return { path: below(world, `/cuts/${cut}/difference?against=${cut}`) };
    },
  },
  {
    route: 'GET /api/studies/{study}/cuts/{cut}/file',
    may: ['analyst', 'owner'],
    status: 200,
    prepare: async (world) => ({ path: below(world, `/cuts/${await frozenCut(world)}/file`) }),
    stored: downloads,
  },
];
