/** Small invented data for the pictures: numbers that can be followed by eye. */
import type { CordVisit } from '../../web/charts/cord/types.ts';
import type { SubjectResiduals } from '../../web/charts/residuals/residuals.tsx';
import type { SpaghettiData, SpaghettiSubject } from '../../web/charts/spaghetti/types.ts';

export const cordVisits: CordVisit[] = [
  knot('a', 0, 0, 'done'),
  knot('b', 28, 30, 'partly done'),
  { ...knot('c', 56, 75, 'done'), outOfWindow: true },
  { ...knot('u', null, 90, 'unscheduled'), windowFrom: null, windowTo: null, name: 'unscheduled' },
  knot('d', 126, null, 'missed'),
  knot('e', 168, null, 'overdue'),
  knot('f', 196, null, 'open'),
  knot('g', 252, null, 'upcoming'),
];

function knot(
  id: string,
  targetDay: number | null,
  day: number | null,
  state: CordVisit['state'],
): CordVisit {
  return {
    id,
    name: `Week ${(targetDay ?? 0) / 7}`,
    targetDay,
    day,
    windowFrom: targetDay === null ? null : targetDay - 14,
    windowTo: targetDay === null ? null : targetDay + 14,
    state,
    outOfWindow: false,
  };
}

const WEEKS = [0, 4, 8, 12];

/** Subject k starts at 20 + 2k, falls by a tenth a week, and is seen as often as `seen` says. */
export function subjectOf(index: number, seen = WEEKS.length): SpaghettiSubject {
  const readings = WEEKS.slice(0, seen).map((time) => ({
    time,
    value: 20 + 2 * index - 0.1 * time + (time % 8 === 4 ? 0.5 : 0),
    visit: `Week ${time}`,
  }));
  return {
    id: `id-${index}`,
    code: `AL${100 + index}`,
    group: null,
    readings,
    ended: seen < WEEKS.length ? { word: 'withdrawn', time: null } : null,
    own: seen > 1 ? { intercept: 20 + 2 * index, slope: -0.1, n: seen } : null,
  };
}

export function spaghettiOf(subjects: readonly SpaghettiSubject[]): SpaghettiData {
  return {
    subjects,
    visits: WEEKS.map((time) => ({
      name: `Week ${time}`,
      time,
      n: subjects.filter((subject) => subject.readings.some((each) => each.time === time)).length,
    })),
    lines: [
      {
        group: null,
        points: WEEKS.map((time) => ({
          time,
          estimate: 25 - 0.1 * time,
          lower: 24 - 0.1 * time,
          upper: 26 - 0.1 * time,
          remaining: subjects.filter((subject) => (subject.readings.at(-1)?.time ?? -1) >= time)
            .length,
        })),
      },
    ],
    measure: 'sway path',
    unit: 'cm',
    fromZero: false,
    timeName: 'weeks since baseline',
    per: 'a week',
    lineName: 'pooled line',
  };
}

export const six = spaghettiOf(
  [0, 1, 2, 3, 4, 5].map((index) => subjectOf(index, index === 5 ? 2 : 4)),
);

export const residuals: SubjectResiduals[] = [
  { id: 'id-0', code: 'AL100', mean: -2, residuals: [-3, -2, -1] },
  { id: 'id-1', code: 'AL101', mean: 0.5, residuals: [0, 1] },
  { id: 'id-2', code: '=AL102', mean: 3, residuals: [3] },
];

export const bins = [
  { lag: 4, value: 2, pairs: 40 },
  { lag: 8, value: 3, pairs: 24 },
  { lag: 12, value: 3.5, pairs: 8 },
];

export const stampWords = 'independence not met';

export function pictureOf(stamp: string | null) {
  return {
    title: 'Sway path falls by 0.10 cm a week',
    text: 'The pooled line falls by 0.10 cm a week.',
    source: 'Cut 2, specification 1 of sway path, 6 subjects.',
    stamp,
    fileName: 'sway-path',
  };
}
