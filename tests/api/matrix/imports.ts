/** Imports: the coordinator's, each over a file of its own. */
import { setTimeout as wait } from 'node:timers/promises';
import type { ImportMapping, ImportView } from '../../../api/contracts/imports.ts';
import type { MatrixRow } from './row.ts';
import type { World } from './world.ts';

const pathOf = (world: World) => `/api/studies/${world.study.uid}/imports`;

const mapping: ImportMapping = {
  subject: 'subject',
  value: 'weight',
  when: { kind: 'days', column: 'day' },
  replicate: null,
  site: null,
  decimal: '.',
  newSubjects: {
    site: { from: 'fixed', value: 'elm' },
    consentVersion: { from: 'fixed', value: '1' },
    consentDate: { from: 'fixed', value: '2026-11-01' },
    baselineDate: { from: 'fixed', value: '2026-11-02' },
    order: 'year-month-day',
  },
};

let files = 0;
/** A new subject a file, one fresh row, one that is refused and one outside the plausible range. */
function file(): string {
  files += 1;
  const code = `IMP-${files}`;
  return `subject,weight,day\n${code},71.5,0\n${code},seven,14\n${code},39,14\n`;
}

async function measureOf(world: World): Promise<string> {
  const [row] = await world.query<{ uid: string }>(
    `SELECT uid FROM measure WHERE study_id = $1 AND short_name = 'weight'`,
    [world.study.id],
  );
  return row?.uid ?? '';
}

async function uploaded(world: World): Promise<ImportView> {
  const agent = await world.agent('coordinator');
  const answer = await agent
    .post(pathOf(world))
    .field('measure', await measureOf(world))
    .attach('file', Buffer.from(file()), 'weights.csv')
    .expect(201);
  return answer.body;
}

async function checked(world: World): Promise<ImportView> {
  const agent = await world.agent('coordinator');
  const { id, version } = await uploaded(world);
  await agent
    .post(`${pathOf(world)}/${id}/check`)
    .send({ mapping, version })
    .expect(202);
  for (let tries = 0; tries < 200; tries += 1) {
    const view: ImportView = (await agent.get(`${pathOf(world)}/${id}`).expect(200)).body;
    if (view.state === 'checked') return view;
    if (view.state !== 'checking') throw new Error(`the dry run ended as ${view.state}`);
    await wait(100);
  }
  throw new Error('the dry run did not end');
}

const ofChecked = (tail: string) => async (world: World) => ({
  path: `${pathOf(world)}/${(await world.once('imports: checked', () => checked(world))).id}${tail}`,
});

const importsStored = (world: World) =>
  world.query('SELECT uid, state, version FROM import ORDER BY id');

const read = (tail: string, query = ''): MatrixRow => ({
  route: `GET /api/studies/{study}/imports/{import}${tail}`,
  may: ['coordinator'],
  status: 200,
  prepare: ofChecked(`${tail}${query}`),
});

export const importRows: MatrixRow[] = [
  {
    route: 'GET /api/studies/{study}/imports/choices',
    may: ['coordinator'],
    status: 200,
    prepare: async (world) => ({ path: `${pathOf(world)}/choices` }),
  },
  {
    route: 'GET /api/studies/{study}/imports',
    may: ['coordinator'],
    status: 200,
    prepare: async (world) => ({ path: `${pathOf(world)}?sort=fileName` }),
  },
  {
    route: 'POST /api/studies/{study}/imports',
    may: ['coordinator'],
    status: 201,
    prepare: async (world) => ({
      path: pathOf(world),
      upload: {
        fields: { measure: await measureOf(world) },
        name: 'weights.csv',
        content: file(),
      },
    }),
    stored: importsStored,
  },
  read(''),
  read('/refusals', '?pageSize=5'),
  read('/refusals.csv'),
  read('/implausible', '?pageSize=5'),
  {
    route: 'POST /api/studies/{study}/imports/{import}/check',
    may: ['coordinator'],
    status: 202,
    prepare: async (world) => {
      const { id, version } = await uploaded(world);
      return { path: `${pathOf(world)}/${id}/check`, body: { mapping, version } };
    },
    stored: importsStored,
  },
  {
    route: 'POST /api/studies/{study}/imports/{import}/apply',
    may: ['coordinator'],
    status: 202,
    prepare: async (world) => {
      const { id, version } = await checked(world);
      return {
        path: `${pathOf(world)}/${id}/apply`,
        body: { keepImplausible: false, explanation: null, version },
      };
    },
    stored: importsStored,
  },
  {
    route: 'POST /api/studies/{study}/imports/{import}/cancel',
    may: ['coordinator'],
    status: 200,
    prepare: async (world) => ({ path: `${pathOf(world)}/${(await uploaded(world)).id}/cancel` }),
    stored: importsStored,
  },
];
