/** Loads the demo: invented people, three invented studies, their past up to the day of seeding. */
import { randomBytes } from 'node:crypto';
import type { SetupFileInput } from '../api/contracts/setup.ts';
import { addDays, momentOf } from './days.ts';
import { type Account, DemoClock, type DemoDeps, type DemoStudy, DemoWorld } from './demo-world.ts';
import { playHarrowFen } from './harrow-fen/play.ts';
import harrowFenSetup from './harrow-fen/setup.json' with { type: 'json' };
import { playMillLane } from './mill-lane/play.ts';
import millLaneSetup from './mill-lane/setup.json' with { type: 'json' };
import { type DemoRole, demoPeople } from './people.ts';
import reactionSetup from './reaction/setup.json' with { type: 'json' };

const STARTED_DAYS_AGO = 600;

/**
 * @param deps an empty, migrated installation
 * @param now the moment of seeding; all dates count back from its day
 */
export async function loadDemo(deps: DemoDeps, now: Date): Promise<void> {
  const today = now.toISOString().slice(0, 10);
  const started = momentOf(addDays(today, -STARTED_DAYS_AGO), 8, 0);
  const people = await makePeople(deps, started);
  // The studies share no record but the people, so each is played from the same first day.
  const world = () => new DemoWorld(deps, new DemoClock(started));

  const harrowFen = await world().study(harrowFenSetup as SetupFileInput, people.owner);
  await addMembers(harrowFen, people, ['ALD']);
  await harrowFen.add(people.statistician, ['unblinded statistician']);
  await harrowFen.add(people.board, ['board member'], [], true);
  await harrowFen.add(people.safety, ['safety officer']);
  await harrowFen.add(people.birch, ['coordinator'], ['BIR']);
  await harrowFen.add(people.cress, ['coordinator'], ['CRE']);
  await playHarrowFen(
    harrowFen,
    {
      coordinators: { ALD: people.coordinator, BIR: people.birch, CRE: people.cress },
      analyst: people.analyst,
      statistician: people.statistician,
    },
    today,
  );

  const millLane = await world().study(millLaneSetup as SetupFileInput, people.owner);
  await addMembers(millLane, people, ['MIL']);
  await playMillLane(millLane, people, today);

  const reaction = await world().study(reactionSetup as SetupFileInput, people.owner);
  await addMembers(reaction, people, ['LAB']);
}

async function addMembers(study: DemoStudy, people: DemoPeople, sites: string[]): Promise<void> {
  await study.add(people.coordinator, ['coordinator'], sites);
  await study.add(people.monitor, ['monitor']);
  await study.add(people.analyst, ['analyst']);
}

const KEYS = {
  owner: 'owner',
  coordinator: 'coordinator',
  monitor: 'monitor',
  analyst: 'analyst',
  statistician: 'unblinded statistician',
  board: 'board member',
  safety: 'safety officer',
  administrator: 'administrator',
} as const satisfies Record<string, DemoRole>;

type DemoPeople = Record<keyof typeof KEYS | 'birch' | 'cress', Account>;

async function makePeople(deps: DemoDeps, started: Date): Promise<DemoPeople> {
  const world = new DemoWorld(deps, new DemoClock(started));
  const made: Partial<DemoPeople> = {};
  for (const [key, role] of Object.entries(KEYS) as [keyof typeof KEYS, DemoRole][]) {
    const person = demoPeople.find((candidate) => candidate.role === role);
    if (!person) throw new Error(`no demo account for ${role}`);
    made[key] = await world.account(person, role === 'administrator');
  }
  // Colleagues at the other halls; nobody signs in as them.
  made.birch = await world.account(colleague('birch', 'Brenna Rook'));
  made.cress = await world.account(colleague('cress', 'Corin Teal'));
  return made as DemoPeople;
}

function colleague(hall: string, name: string) {
  return {
    email: `${hall}@harrowfen.example`,
    name,
    password: randomBytes(24).toString('base64url'),
  };
}
