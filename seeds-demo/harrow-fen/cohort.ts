/**
 * The invented cohort of the Harrow Fen balance study: who came when, and what was read. Sway path has a
 * level of its own for each subject, a drift, and errors that fade with time; nothing here is a real person.
 */
import { addDays, daysBetween } from '../days.ts';
import { Draws } from '../draws.ts';

export const HARROW_FEN_VISITS = [
  { name: 'Baseline', day: 0, before: 0, after: 3 },
  { name: 'Week 4', day: 28, before: 5, after: 5 },
  { name: 'Week 8', day: 56, before: 5, after: 5 },
  { name: 'Week 12', day: 84, before: 7, after: 7 },
  { name: 'Week 18', day: 126, before: 7, after: 7 },
  { name: 'Week 24', day: 168, before: 10, after: 10 },
  { name: 'Week 36', day: 252, before: 14, after: 14 },
  { name: 'Week 48', day: 336, before: 14, after: 14 },
] as const;

const SITES = [
  { code: 'ALD', letters: 'AL', subjects: 62 },
  { code: 'BIR', letters: 'BI', subjects: 55 },
  { code: 'CRE', letters: 'CR', subjects: 44 },
] as const;

const MISS_REASONS = [
  'ill or in hospital',
  'away',
  'could not be reached',
  'weather or transport',
] as const;

const ENROLMENT_OPENED_DAYS_AGO = 560;
const ENROLMENT_LASTED_DAYS = 430;

export type CohortReading = { measure: string; value: number | string; limit?: '<' | '>' };
export type CohortVisit = {
  planned: string | null;
  date: string;
  enteredAfterDays: number;
  contact: 'in person' | 'phone';
  readings: CohortReading[];
  notDone: { measure: string; category: 'instrument failure' | 'subject refused' }[];
};
export type CohortMiss = {
  planned: string;
  recordedOn: string;
  reason: (typeof MISS_REASONS)[number];
};
export type CohortEnd = {
  on: string;
  state: 'withdrawn from visits' | 'consent withdrawn' | 'lost to follow-up' | 'died' | 'completed';
  reason: string;
};
export type CohortSubject = {
  code: string;
  site: string;
  arm: 0 | 1;
  consentDate: string;
  baselineDate: string;
  age: number;
  sex: 'f' | 'm';
  visits: CohortVisit[];
  misses: CohortMiss[];
  end: CohortEnd | null;
};

/** @param today the day of seeding, to which all dates count back */
export function harrowFenCohort(today: string): CohortSubject[] {
  const subjects: CohortSubject[] = [];
  let index = 0;
  for (const site of SITES) {
    for (let k = 0; k < site.subjects; k += 1) {
      const code = `${site.letters}${101 + k}`;
      const baselineAgo =
        ENROLMENT_OPENED_DAYS_AGO - Math.round((ENROLMENT_LASTED_DAYS * (k + 0.5)) / site.subjects);
      subjects.push(makeSubject(code, site.code, index, addDays(today, -baselineAgo), today));
      index += 1;
    }
  }
  return subjects;
}

function makeSubject(
  code: string,
  site: string,
  index: number,
  baselineDate: string,
  today: string,
): CohortSubject {
  const draws = new Draws('harrow fen subject', index);
  const arm = draws.chance(0.5) ? 1 : 0;
  const age = draws.between(61, 88);
  const subject: CohortSubject = {
    code,
    site,
    arm,
    consentDate: addDays(baselineDate, -draws.between(1, 9)),
    baselineDate,
    age,
    sex: draws.chance(0.58) ? 'f' : 'm',
    visits: [],
    misses: [],
    end: endOf(draws, baselineDate, today),
  };
  followUp(subject, draws, index, today);
  return subject;
}

function endOf(draws: Draws, baselineDate: string, today: string): CohortEnd | null {
  const followed = daysBetween(baselineDate, today);
  if (draws.chance(0.17)) {
    const day = draws.between(40, 330);
    const end = draws.pick([
      { state: 'withdrawn from visits', reason: 'no more visits wanted' },
      { state: 'withdrawn from visits', reason: 'moved away' },
      { state: 'lost to follow-up', reason: 'no answer to three calls' },
      { state: 'lost to follow-up', reason: 'no answer to a letter' },
      { state: 'consent withdrawn', reason: 'consent withdrawn in writing' },
      { state: 'died', reason: 'reported by the family' },
    ] as const);
    if (day < followed) return { on: addDays(baselineDate, day), ...end };
    return null;
  }
  if (followed > 352) {
    return { on: addDays(baselineDate, 352), state: 'completed', reason: 'last visit done' };
  }
  return null;
}

function followUp(subject: CohortSubject, draws: Draws, index: number, today: string): void {
  const traits = traitsOf(subject, draws, index);
  let carried = draws.normal();
  let before = 0;
  for (const planned of HARROW_FEN_VISITS) {
    const outOfWindow = planned.day > 0 && draws.chance(0.04);
    const spread = outOfWindow
      ? planned.after + draws.between(2, 6)
      : draws.between(-planned.before, planned.after);
    const day = planned.day === 0 ? 0 : planned.day + spread;
    const date = addDays(subject.baselineDate, day);
    const windowCloses = addDays(subject.baselineDate, planned.day + planned.after);
    // Drawn whether or not the visit takes place, so that one subject's story moves no other number.
    const missed = planned.day > 0 && draws.chance(0.05);
    const fades = Math.exp(-(day - before) / 45);
    carried = fades * carried + Math.sqrt(1 - fades * fades) * draws.normal();
    before = day;
    const visit = visitOf(planned.name, date, day, traits, carried, draws);
    if (subject.end && subject.end.state !== 'completed' && date >= subject.end.on) continue;
    if (missed) {
      const recordedOn = addDays(windowCloses, draws.between(1, 4));
      if (recordedOn < today && (!subject.end || recordedOn < subject.end.on)) {
        subject.misses.push({
          planned: planned.name,
          recordedOn,
          reason: draws.pick(MISS_REASONS),
        });
      }
      continue;
    }
    if (addDays(date, visit.enteredAfterDays) < today) subject.visits.push(visit);
    if (draws.chance(0.015)) {
      const extra = addDays(date, planned.after + draws.between(9, 12));
      if (extra < today && (!subject.end || extra < subject.end.on)) {
        subject.visits.push({
          ...visitOf(null, extra, day + 10, traits, carried, draws),
          notDone: [],
        });
      }
    }
  }
}

type Traits = { level: number; slope: number; stand: number; pulse: number; fallRate: number };

function traitsOf(subject: CohortSubject, draws: Draws, index: number): Traits {
  const outlying = index === 37;
  return {
    level: 29 + 0.16 * (subject.age - 74) + 6.2 * draws.normal() + (outlying ? 9 : 0),
    slope: -0.045 - (subject.arm === 1 ? 0.05 : 0) + 0.085 * draws.normal() + (outlying ? 0.42 : 0),
    stand: Math.exp(2.5 - 0.02 * (subject.age - 74) + 0.45 * draws.normal()),
    pulse: 70 + 7 * draws.normal(),
    fallRate: Math.exp(-1.5 + 0.5 * draws.normal()),
  };
}

const tenth = (value: number) => Math.round(value * 10) / 10;

function visitOf(
  planned: string | null,
  date: string,
  day: number,
  traits: Traits,
  carried: number,
  draws: Draws,
): CohortVisit {
  const weeks = day / 7;
  const sway = Math.max(
    7,
    traits.level + traits.slope * weeks + 2.1 * carried + 1.5 * draws.normal(),
  );
  const stand = traits.stand * Math.exp(0.003 * weeks + 0.22 * draws.normal());
  const pulse = Math.round(traits.pulse + 4.5 * draws.normal());
  const falls = draws.count(day === 0 ? traits.fallRate : traits.fallRate * 0.9);
  const late = draws.chance(0.05);
  const broken = draws.chance(0.012);
  const refused = draws.chance(0.02);
  const readings: CohortReading[] = [
    { measure: 'pulse', value: pulse },
    { measure: 'falls', value: falls },
  ];
  const notDone: CohortVisit['notDone'] = [];
  if (broken) notDone.push({ measure: 'sway_path', category: 'instrument failure' });
  else readings.push({ measure: 'sway_path', value: tenth(sway) });
  if (refused) notDone.push({ measure: 'stand_time', category: 'subject refused' });
  else if (stand > 60) readings.push({ measure: 'stand_time', value: 60, limit: '>' });
  else readings.push({ measure: 'stand_time', value: Math.max(0.3, tenth(stand)) });
  return {
    planned,
    date,
    enteredAfterDays: late ? draws.between(15, 34) : draws.between(0, 2),
    contact: 'in person',
    readings,
    notDone,
  };
}
