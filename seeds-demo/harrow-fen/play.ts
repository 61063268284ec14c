/** Plays the Harrow Fen balance study from its first enrolment to the day of seeding. */
import { enterAllocation } from '../../api/features/allocation/service.ts';
import { correctReading } from '../../api/features/readings/service.ts';
import { changeSubjectState, enrolSubject } from '../../api/features/subjects/service.ts';
import { logVisit, missVisit } from '../../api/features/visits/service.ts';
import { checkAndFit, freeze, sign } from '../analyses.ts';
import { addDays, momentOf } from '../days.ts';
import type { Account, DemoStudy } from '../demo-world.ts';
import { type DemoEvent, play } from '../events.ts';
import { importFile } from '../import-file.ts';
import { type CohortSubject, type CohortVisit, harrowFenCohort } from './cohort.ts';

export type HarrowFenPeople = {
  coordinators: Record<string, Account>;
  analyst: Account;
  statistician: Account;
};

const ARMS = ['Seated stretching routine', 'Standing balance routine'] as const;
const MEASURES = ['sway_path', 'stand_time', 'pulse', 'falls', 'age', 'sex'];
/** Pulse of Alder in these days before seeding was read by a monitor and came as a file. */
const DEVICE = { site: 'ALD', from: 120, to: 50, importedAgo: 45 };

export async function playHarrowFen(
  study: DemoStudy,
  people: HarrowFenPeople,
  today: string,
): Promise<void> {
  const cohort = harrowFenCohort(today);
  const device: { code: string; visit: CohortVisit }[] = [];
  const events: DemoEvent[] = [];
  for (const subject of cohort) events.push(...eventsOf(study, people, subject, today, device));
  events.push(...correctionsOf(study, people, cohort, today));
  events.push({
    at: momentOf(addDays(today, -121), 9, 0),
    run: () => allocate(study, people.statistician, cohort, today),
  });
  events.push({
    at: momentOf(addDays(today, -DEVICE.importedAgo), 11, 0),
    run: () => importPulse(study, people, device),
  });
  events.push(...analysesOf(study, people.analyst, today));
  await play(study.world.clock, events);
}

function eventsOf(
  study: DemoStudy,
  people: HarrowFenPeople,
  subject: CohortSubject,
  today: string,
  device: { code: string; visit: CohortVisit }[],
): DemoEvent[] {
  const { code } = subject;
  const coordinator = people.coordinators[subject.site];
  if (!coordinator) throw new Error(`nobody coordinates ${subject.site}`);
  const act = (run: Parameters<typeof study.act>[2]) => () =>
    study.act(coordinator, 'coordinator', run);
  const minute = Number(code.slice(2)) % 50;
  const events: DemoEvent[] = [
    {
      at: momentOf(subject.baselineDate, 9, minute),
      run: act((inStudy) =>
        enrolSubject(inStudy, {
          siteCode: subject.site,
          code,
          state: 'enrolled',
          consentVersion: '1.1',
          consentDate: subject.consentDate,
          enrolmentDate: subject.baselineDate,
          baselineDate: subject.baselineDate,
        }),
      ),
    },
  ];
  for (const visit of subject.visits) {
    const fromDevice = isFromDevice(subject.site, visit, today);
    if (fromDevice) device.push({ code, visit });
    events.push({
      at: momentOf(addDays(visit.date, visit.enteredAfterDays), 10, minute),
      run: act((inStudy) => logVisit(inStudy, visitInput(subject, visit, fromDevice))),
    });
  }
  for (const miss of subject.misses) {
    events.push({
      at: momentOf(miss.recordedOn, 14, minute),
      run: act((inStudy) =>
        missVisit(inStudy, { subjectCode: code, planned: miss.planned, reason: miss.reason }),
      ),
    });
  }
  if (subject.end) {
    const { on, state, reason } = subject.end;
    // After what was read before the end has been entered, as it is at a site.
    const last = Math.max(
      ...subject.visits.map((visit) => Date.parse(addDays(visit.date, visit.enteredAfterDays))),
      Date.parse(on),
    );
    const known = new Date(last).toISOString().slice(0, 10);
    events.push({
      at: momentOf(known, 15, minute),
      run: act((inStudy) =>
        changeSubjectState(inStudy, { subjectCode: code, state, date: on, reason }),
      ),
    });
  }
  return events.filter((event) => event.at < momentOf(today, 0, 0));
}

function isFromDevice(site: string, visit: CohortVisit, today: string): boolean {
  const { from, to } = DEVICE;
  return (
    site === DEVICE.site &&
    visit.enteredAfterDays <= 2 &&
    visit.date >= addDays(today, -from) &&
    visit.date <= addDays(today, -to)
  );
}

/** Outside the plausible range: kept with what the coordinator wrote at the visit. */
const PLAUSIBLE: Record<string, [number, number]> = {
  sway_path: [8, 60],
  stand_time: [0.2, 60],
  pulse: [45, 105],
  falls: [0, 6],
};

function visitInput(subject: CohortSubject, visit: CohortVisit, pulseFromDevice: boolean) {
  const values = visit.readings
    .filter(({ measure }) => !(pulseFromDevice && measure === 'pulse'))
    .map(({ measure, value, limit }) => {
      if (limit) return { measure, limit: { sign: limit, value: Number(value) } };
      const [low, high] = PLAUSIBLE[measure] ?? [
        Number.NEGATIVE_INFINITY,
        Number.POSITIVE_INFINITY,
      ];
      const unusual = Number(value) < low || Number(value) > high;
      return {
        measure,
        value: Number(value),
        explanation: unusual ? 'read again, correct' : null,
      };
    });
  const notDone = visit.notDone.map(({ measure, category }) => ({ measure, notDone: category }));
  const once =
    visit.planned === 'Baseline'
      ? [
          { measure: 'age', value: subject.age },
          { measure: 'sex', choice: subject.sex },
        ]
      : [];
  return {
    subjectCode: subject.code,
    planned: visit.planned,
    unscheduledReason: visit.planned === null ? 'a fall at home' : null,
    date: visit.date,
    contactMode: visit.contact,
    readings: [...values, ...notDone, ...once],
  };
}

async function allocate(
  study: DemoStudy,
  statistician: Account,
  cohort: readonly CohortSubject[],
  today: string,
): Promise<void> {
  const enrolled = cohort.filter((subject) => subject.baselineDate <= addDays(today, -121));
  await study.act(statistician, 'unblinded statistician', (act) =>
    enterAllocation(
      act,
      enrolled.map(({ code, arm }) => ({ subjectCode: code, armName: ARMS[arm] })),
    ),
  );
}

async function importPulse(
  study: DemoStudy,
  people: HarrowFenPeople,
  device: readonly { code: string; visit: CohortVisit }[],
): Promise<void> {
  const coordinator = people.coordinators[DEVICE.site];
  if (!coordinator) throw new Error('nobody can import');
  const lines = device.map(({ code, visit }) => {
    const pulse = visit.readings.find(({ measure }) => measure === 'pulse');
    return `${code},${visit.date},${pulse?.value ?? ''}`;
  });
  // A code of another site, and a value with its unit: such files hold them.
  const [one, two] = device;
  if (one && two) {
    lines.splice(3, 0, `BI101,${one.visit.date},71`, `${two.code},${two.visit.date},66 bpm`);
  }
  const file = {
    name: 'pulse-monitor.csv',
    text: ['subject,date,pulse', ...lines, ''].join('\n'),
    measure: 'pulse',
    mapping: {
      subject: 'subject',
      value: 'pulse',
      when: { kind: 'date', column: 'date', order: 'year-month-day' },
      replicate: null,
      site: null,
      decimal: '.',
      newSubjects: null,
    },
  } as const;
  await importFile(study, coordinator, file);
}

/** A few readings that were corrected a fortnight after they were entered. */
function correctionsOf(
  study: DemoStudy,
  people: HarrowFenPeople,
  cohort: readonly CohortSubject[],
  today: string,
): DemoEvent[] {
  return cohort
    .filter((subject, index) => index % 23 === 5 && subject.visits.length > 2)
    .flatMap((subject) => {
      const visit = subject.visits[1];
      const coordinator = people.coordinators[subject.site];
      const sway = visit?.readings.find(({ measure }) => measure === 'sway_path');
      if (!visit || !coordinator || !sway || visit.planned === null) return [];
      const at = momentOf(addDays(visit.date, visit.enteredAfterDays + 14), 16, 5);
      if (at >= momentOf(today, 0, 0)) return [];
      return [
        {
          at,
          run: () =>
            correctSway(study, coordinator, subject.code, visit.planned ?? '', Number(sway.value)),
        },
      ];
    });
}

async function correctSway(
  study: DemoStudy,
  coordinator: Account,
  code: string,
  planned: string,
  value: number,
): Promise<void> {
  const rows: { uid: string; version: number }[] = await study.world.deps.databases.masked.query(
    `SELECT r.uid, r.version FROM reading r
       JOIN subject s ON s.id = r.subject_id AND s.study_id = $1 AND s.code = $2
       JOIN visit v ON v.id = r.visit_id
       JOIN planned_visit p ON p.id = v.planned_visit_id AND p.name = $3
       JOIN measure m ON m.id = r.measure_id AND m.short_name = 'sway_path'`,
    [study.id, code, planned],
  );
  const reading = rows[0];
  if (!reading) return;
  await study.act(coordinator, 'coordinator', (act) =>
    correctReading(act, {
      readingUid: reading.uid,
      version: reading.version,
      value: Math.round((value + 0.4) * 10) / 10,
      reason: 'transcription error',
      reasonText: 'digits of the paper sheet read wrongly',
    }),
  );
}

function analysesOf(study: DemoStudy, analyst: Account, today: string): DemoEvent[] {
  const sway = {
    measure: 'sway_path',
    axis: 'since_baseline',
    unit: 'weeks',
    group: false,
  } as const;
  let first = '';
  let record = '';
  return [
    {
      at: momentOf(addDays(today, -98), 9, 30),
      run: async () => {
        const visitCutoff = addDays(today, -105);
        first = await freeze(study, analyst, {
          name: 'Half-way cut',
          visitCutoff,
          measures: MEASURES,
        });
      },
    },
    {
      at: momentOf(addDays(today, -97), 10, 0),
      run: async () => {
        record = await checkAndFit(study, analyst, first, {
          specification: sway,
          fit: 'pooled',
          purpose: 'planned',
        });
      },
    },
    {
      at: momentOf(addDays(today, -96), 16, 20),
      run: () => sign(study, analyst, record),
    },
    {
      at: momentOf(addDays(today, -6), 9, 30),
      run: async () => {
        const visitCutoff = addDays(today, -9);
        const cut = await freeze(study, analyst, {
          name: 'Autumn cut',
          visitCutoff,
          measures: MEASURES,
        });
        await checkAndFit(study, analyst, cut, {
          specification: { ...sway, measure: 'pulse' },
          fit: 'pooled',
          purpose: 'exploratory',
        });
      },
    },
  ];
}
