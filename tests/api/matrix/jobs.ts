/** Long work: each person sees what they started, and nothing of anybody else's. */
import type { MatrixRow, Who } from './row.ts';
import type { World } from './world.ts';

/** Work of one person that waits, and that no worker will take. */
async function jobOf(world: World, who: Who | null): Promise<string> {
  const person = world.people[who === null || who === 'anonymous' ? 'coordinator' : who];
  const [row] = await world.query<{ uid: string }>(
    `INSERT INTO job (kind, account_id, created_at) VALUES ('for the table', $1, '2026-12-01') RETURNING uid`,
    [person.id],
  );
  return row?.uid ?? '';
}

export const jobRows: MatrixRow[] = [
  {
    route: 'GET /api/jobs/{job}',
    may: ['signed in'],
    own: true,
    status: 200,
    prepare: async (world, who) => ({ path: `/api/jobs/${await jobOf(world, who)}` }),
  },
  {
    route: 'GET /api/jobs/{job}/events',
    may: ['signed in'],
    own: true,
    status: 200,
    prepare: async (world, who) => {
      const job = await jobOf(world, who);
      // Ended, so that the stream ends.
      await world.query(
        `UPDATE job SET state = 'done', finished_at = '2026-12-01' WHERE uid = $1`,
        [job],
      );
      return { path: `/api/jobs/${job}/events` };
    },
  },
  {
    route: 'POST /api/jobs/{job}/cancel',
    may: ['signed in'],
    own: true,
    status: 200,
    prepare: async (world, who) => ({ path: `/api/jobs/${await jobOf(world, who)}/cancel` }),
    stored: (world) => world.query('SELECT uid, cancel_requested FROM job ORDER BY id'),
  },
];
