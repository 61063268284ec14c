/** What the spaghetti plot draws, from the used readings of a cut. */
import type { z } from 'zod';
import type { BandPoint } from '../../core/index.ts';
import type { pictureSchema, SpecificationInput } from '../contracts/analysis.ts';
import { type CutTable, toUnit } from './cut-table.ts';
import type { Drawing, FitJob } from './jobs.ts';

/** Enough for a smooth edge of a band that bends. */
const BAND_POINTS = 49;

export interface UsedReading {
  subject: string;
  time: number;
  response: number;
  group: string | null;
  visit: string;
  plannedDay: number;
}

/** The rows that the engine uses, in the order of the cut. */
export function usedReadings({ table, visit, plannedDay }: CutTable): UsedReading[] {
  const used: UsedReading[] = [];
  table.subject.forEach((subject, row) => {
    const time = table.time[row] ?? Number.NaN;
    const response = table.response[row] ?? Number.NaN;
    const group = table.group === undefined ? null : (table.group[row] ?? '');
    if (!Number.isNaN(time) && !Number.isNaN(response) && group !== '') {
      used.push({
        subject,
        time,
        response,
        group,
        visit: visit[row] ?? '',
        plannedDay: plannedDay[row] ?? Number.NaN,
      });
    }
  });
  return used;
}

/** Evenly spaced times over the readings, both ends included. */
export function bandTimes(readings: readonly UsedReading[]): number[] {
  let first = Number.POSITIVE_INFINITY;
  let last = Number.NEGATIVE_INFINITY;
  for (const { time } of readings) {
    first = Math.min(first, time);
    last = Math.max(last, time);
  }
  const step = (last - first) / (BAND_POINTS - 1);
  return Array.from({ length: BAND_POINTS }, (_, at) =>
    at === BAND_POINTS - 1 ? last : first + at * step,
  );
}

export function drawingOf(
  readings: readonly UsedReading[],
  unit: SpecificationInput['unit'],
  line: readonly BandPoint[],
): Drawing {
  const subjects = new Map<string, Drawing['subjects'][number]>();
  const visits = new Map<string, Drawing['visits'][number]>();
  const lastTimes = new Map<string | null, Map<string, number>>();
  for (const { subject, time, response, group, visit, plannedDay } of readings) {
    const own = subjects.get(subject) ?? { code: subject, group, readings: [] };
    own.readings.push({ time, value: response, visit });
    subjects.set(subject, own);
    if (!Number.isNaN(plannedDay)) {
      const at = visits.get(visit) ?? { name: visit, time: toUnit(plannedDay, unit), n: 0 };
      at.n += 1;
      visits.set(visit, at);
    }
    const last = lastTimes.get(group) ?? new Map<string, number>();
    last.set(subject, Math.max(last.get(subject) ?? Number.NEGATIVE_INFINITY, time));
    lastTimes.set(group, last);
  }
  for (const own of subjects.values()) {
    own.readings.sort((a, b) => a.time - b.time);
  }
  const bands = new Map<string | null, Drawing['band'][number]>();
  for (const { group, ...point } of line) {
    const band = bands.get(group) ?? { group, points: [] };
    let remaining = 0;
    for (const last of lastTimes.get(group)?.values() ?? []) {
      remaining += last >= point.time ? 1 : 0;
    }
    band.points.push({ ...point, remaining });
    bands.set(group, band);
  }
  return {
    subjects: [...subjects.values()],
    visits: [...visits.values()].sort((a, b) => a.time - b.time),
    band: [...bands.values()],
  };
}

/** With opaque ids, and the ends of follow-up that the cut knows. */
export function pictureOf(
  drawing: Drawing,
  { ids, ended, specification }: Pick<FitJob, 'ids' | 'ended' | 'specification'>,
): z.infer<typeof pictureSchema> {
  const ends = new Map(ended.map((end) => [end.code, end]));
  const timeOf = (day: number | null) => (day === null ? null : toUnit(day, specification.unit));
  return {
    ...drawing,
    subjects: drawing.subjects.map((subject) => {
      const end = ends.get(subject.code);
      return {
        id: ids.get(subject.code) ?? subject.code,
        ...subject,
        ended: end ? { word: end.word, time: timeOf(end.day) } : null,
      };
    }),
  };
}
