/** Plays the Mill Lane walking groups; nothing is masked here, so groups are open. */
import { enterAllocation } from '../../api/features/allocation/service.ts';
import { enrolSubject } from '../../api/features/subjects/service.ts';
import { logVisit } from '../../api/features/visits/service.ts';
import { checkAndFit, freeze } from '../analyses.ts';
import { addDays, momentOf } from '../days.ts';
import type { Account, DemoStudy } from '../demo-world.ts';
import { type DemoEvent, play } from '../events.ts';
import { millLaneCohort } from './cohort.ts';

const GROUPS = ['Canal group', 'Hill group'] as const;

export async function playMillLane(
  study: DemoStudy,
  people: { coordinator: Account; analyst: Account; owner: Account },
  today: string,
): Promise<void> {
  const walkers = millLaneCohort(today);
  const events: DemoEvent[] = [];
  for (const [index, walker] of walkers.entries()) {
    events.push({
      at: momentOf(walker.baselineDate, 9, index),
      run: () =>
        study.act(people.coordinator, 'coordinator', (act) =>
          enrolSubject(act, {
            siteCode: 'MIL',
            code: walker.code,
            state: 'enrolled',
            consentVersion: '1',
            consentDate: walker.consentDate,
            enrolmentDate: walker.baselineDate,
            baselineDate: walker.baselineDate,
          }),
        ),
    });
    for (const visit of walker.visits) {
      events.push({
        at: momentOf(visit.date, 11, index),
        run: () =>
          study.act(people.coordinator, 'coordinator', (act) =>
            logVisit(act, {
              subjectCode: walker.code,
              planned: visit.planned,
              date: visit.date,
              contactMode: 'in person',
              readings: [{ measure: 'walk_distance', value: visit.distance }],
            }),
          ),
      });
    }
  }
  events.push({
    at: momentOf(addDays(today, -150), 8, 0),
    run: () =>
      study.act(people.owner, 'owner', (act) =>
        enterAllocation(
          act,
          walkers.map(({ code, group }) => ({ subjectCode: code, armName: GROUPS[group] })),
        ),
      ),
  });
  events.push({
    at: momentOf(addDays(today, -4), 14, 0),
    run: async () => {
      const cut = await freeze(study, people.analyst, {
        name: 'Walks up to last week',
        visitCutoff: addDays(today, -5),
        measures: ['walk_distance'],
      });
      await checkAndFit(study, people.analyst, cut, {
        specification: {
          measure: 'walk_distance',
          axis: 'since_baseline',
          unit: 'weeks',
          group: true,
        },
        fit: 'pooled',
        purpose: 'planned',
      });
    },
  });
  await play(study.world.clock, events);
}
