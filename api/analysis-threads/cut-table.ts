/** The bytes of a cut as the table that the engine takes, with a count of what it can't use. */
import Papa from 'papaparse';
import type { LongTable } from '../../core/table/long-table.ts';
import type { SpecificationInput } from '../contracts/analysis.ts';

export interface UsedCounts {
  rows: number;
  used: number;
  missing: number;
  censored: number;
  notDone: number;
  excluded: number;
  noTime: number;
  noGroup: number;
}

export interface CutTable {
  table: LongTable;
  counts: UsedCounts;
  /** One a row: the label of the visit and its planned day (NaN where it is outside the plan). */
  visit: string[];
  plannedDay: Float64Array;
}

const DAYS_PER_WEEK = 7;

/** Days on the unit of the specification. */
export function toUnit(days: number, unit: SpecificationInput['unit']): number {
  return unit === 'weeks' ? days / DAYS_PER_WEEK : days;
}

/**
 * @param bytes the canonical CSV; its rows stand on one line each, the header being line 1
 * @throws Error when a column is missing: the caller has checked the measure and the group before
 */
export function tableOfCut(bytes: Uint8Array, specification: SpecificationInput): CutTable {
  const lines = Papa.parse<string[]>(new TextDecoder('utf-8').decode(bytes), {
    delimiter: ',',
    newline: '\n',
    skipEmptyLines: true,
  }).data;
  const header = lines[0] ?? [];
  const at = (name: string): number => {
    const index = header.indexOf(name);
    if (index < 0) {
      throw new Error(`the cut has no column ${name}`);
    }
    return index;
  };
  const subjectAt = at('subject');
  const visitAt = at('visit');
  const plannedAt = at('planned_day');
  const timeAt = specification.axis === 'planned_day' ? plannedAt : at('day');
  const valueAt = at(specification.measure);
  const noteAt = at(`${specification.measure}_note`);
  const groupAt = specification.group ? at('group') : -1;

  const rows = lines.length - 1;
  const subject: string[] = new Array(rows);
  const visit: string[] = new Array(rows);
  const group: string[] = new Array(specification.group ? rows : 0);
  const time = new Float64Array(rows);
  const response = new Float64Array(rows);
  const plannedDay = new Float64Array(rows);
  const counts: UsedCounts = {
    rows,
    used: 0,
    missing: 0,
    censored: 0,
    notDone: 0,
    excluded: 0,
    noTime: 0,
    noGroup: 0,
  };
  for (let row = 0; row < rows; row++) {
    const cells = lines[row + 1] ?? [];
    subject[row] = cells[subjectAt] ?? '';
    visit[row] = cells[visitAt] ?? '';
    time[row] = toUnit(numberOf(cells[timeAt]), specification.unit);
    plannedDay[row] = numberOf(cells[plannedAt]);
    response[row] = numberOf(cells[valueAt]);
    if (groupAt >= 0) {
      group[row] = cells[groupAt] ?? '';
    }
    counts[reasonOf(response[row], time[row], group[row], cells[noteAt] ?? '')] += 1;
  }
  const table: LongTable = specification.group
    ? { subject, time, response, group }
    : { subject, time, response };
  return { table, counts, visit, plannedDay };
}

function numberOf(text: string | undefined): number {
  return text === undefined || text === '' ? Number.NaN : Number(text);
}

/** Where a row is counted; each in one place, so that the counts add up to the rows. */
function reasonOf(
  response: number | undefined,
  time: number | undefined,
  group: string | undefined,
  note: string,
): Exclude<keyof UsedCounts, 'rows'> {
  if (Number.isNaN(response)) {
    if (note.startsWith('<') || note.startsWith('>')) {
      return 'censored';
    }
    if (note.startsWith('not done: ')) {
      return 'notDone';
    }
    return note.startsWith('excluded: ') ? 'excluded' : 'missing';
  }
  if (Number.isNaN(time)) {
    return 'noTime';
  }
  return group === '' ? 'noGroup' : 'used';
}
