/** The check, the reason that opens the lock, and fits: the analyst's alone. */
import { below, frozenCut, openedCut, specification } from './analysis-ground.ts';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const counts = (world: World) =>
  world.query(`SELECT (SELECT count(*) FROM specification)::int AS specifications,
    (SELECT count(*) FROM check_opening)::int AS openings,
    (SELECT count(*) FROM acknowledgement)::int AS acknowledgements,
    (SELECT count(*) FROM analysis_record)::int AS records`);

export const analysisRows: MatrixRow[] = [
  {
    route: 'POST /api/studies/{study}/cuts/{cut}/check',
    may: ['analyst'],
    status: 200,
    prepare: async (world) => ({
      path: below(world, `/cuts/${await frozenCut(world)}/check`),
      body: { specification },
    }),
    stored: counts,
  },
  {
    route: 'POST /api/studies/{study}/cuts/{cut}/acknowledgements',
    may: ['analyst'],
    status: 201,
    prepare: async (world) => ({
      path: below(world, `/cuts/${await openedCut(world)}/acknowledgements`),
      body: { specification, reason: 'To set the textbook line beside the robust one.' },
    }),
    stored: counts,
  },
  {
    route: 'POST /api/studies/{study}/cuts/{cut}/fits',
    may: ['analyst'],
    status: 201,
    prepare: async (world) => ({
      path: below(world, `/cuts/${await openedCut(world)}/fits`),
      body: { specification, fit: 'pooled', purpose: 'exploratory' },
    }),
    stored: counts,
  },
];
