/** What the analyst's rows stand on: readings, a frozen cut, an opened check and a record. */
import type { Actor } from '../../../api/audit/actor.ts';
import { enterAllocation } from '../../../api/features/allocation/service.ts';
import { enrolSubject } from '../../../api/features/subjects/service.ts';
import { actInStudy } from '../../../api/features/subjects/study-act.ts';
import { logVisit } from '../../../api/features/visits/service.ts';
import { ARMS, type World } from './world.ts';

export const specification = {
  measure: 'weight',
  axis: 'since_baseline',
  unit: 'days',
  group: false,
} as const;

export const freezing = {
  name: 'For the table',
  visitCutoff: '2026-11-30',
  measures: ['weight'],
  exclusions: [],
  includeWithdrawnReason: null,
};

export const below = (world: World, path: string) => `/api/studies/${world.study.uid}${path}`;

/** The cut that all rows ask about. */
export function frozenCut(world: World): Promise<string> {
  return world.once('analysis: cut', async () => {
    await readings(world);
    await seal(world);
    return created(world, '/cuts', freezing);
  });
}

/** The same, with its check opened by the analyst. */
export function openedCut(world: World): Promise<string> {
  return world.once('analysis: opened', async () => {
    const cut = await frozenCut(world);
    await asked(world, `/cuts/${cut}/check`, { specification }, 200);
    return cut;
  });
}

/** A record of its own each time, for what can be done to one only once. */
export async function newRecord(world: World): Promise<{ id: string; contentSha256: string }> {
  const cut = await openedCut(world);
  const body = { specification, fit: 'pooled', purpose: 'planned' };
  const answer = await asked(world, `/cuts/${cut}/fits`, body, 201);
  return { id: answer.id, contentSha256: answer.contentSha256 };
}

export function sharedRecord(world: World): Promise<{ id: string; contentSha256: string }> {
  return world.once('analysis: record', () => newRecord(world));
}

async function created(world: World, path: string, body: object): Promise<string> {
  return (await asked(world, path, body, 201)).id;
}

async function asked(world: World, path: string, body: object, status: number) {
  const agent = await world.agent('analyst');
  const answer = await agent.post(below(world, path)).send(body);
  if (answer.status !== status) {
    throw new Error(`${path} answered ${answer.status}: ${answer.text}`);
  }
  return answer.body as { id: string; contentSha256: string };
}

const CODES = ['T-1', 'T-2', 'T-3', 'T-4'];

function actingAs(world: World, role: 'coordinator' | 'unblinded statistician') {
  const person = world.people[role];
  const actor: Actor = {
    accountId: person.id,
    accountUid: person.uid,
    name: person.name,
    role,
    sessionUid: null,
    requestId: null,
  };
  const { databases } = world.app.deps;
  return {
    db: role === 'coordinator' ? databases.masked : databases.open,
    actor,
    clock: () => world.app.clock.now,
    studyUid: world.study.uid,
    siteIds: null,
  };
}

/** So that there is something which no answer may tell. */
async function seal(world: World): Promise<void> {
  await actInStudy(actingAs(world, 'unblinded statistician'), (act) =>
    enterAllocation(
      act,
      CODES.map((subjectCode, at) => ({ subjectCode, armName: ARMS[at % 2] ?? '' })),
    ),
  );
}

/** Four subjects with three visits each: enough for a line and for its error. */
async function readings(world: World): Promise<void> {
  await actInStudy(actingAs(world, 'coordinator'), async (act) => {
    for (const [at, code] of CODES.entries()) {
      await enrolSubject(act, {
        siteCode: 'elm',
        code,
        state: 'enrolled',
        consentVersion: '1',
        consentDate: '2026-09-30',
        enrolmentDate: '2026-09-30',
        baselineDate: '2026-10-01',
      });
      const visits = [
        ['Start', '2026-10-01', 70],
        ['Week 2', '2026-10-15', 71.5],
        ['Week 4', '2026-10-30', 71 + at],
      ] as const;
      for (const [planned, date, weight] of visits) {
        await logVisit(act, {
          subjectCode: code,
          planned,
          date,
          contactMode: 'in person',
          readings: [{ measure: 'weight', value: weight + 2 * at }],
        });
      }
    }
  });
}
