import { StatsError } from '../errors.ts';
import type { DroppedRow, DropReason, GroupedTable, LongTable } from './long-table.ts';

/** Squares and sums of squares of anything within these bounds stay inside double precision. */
const LARGEST = 1e100;
const SMALLEST = 1e-100;

function lineOf(table: LongTable, row: number): number {
  return table.line?.[row] ?? row + 2;
}

function missingFrom(table: LongTable, row: number): DropReason | null {
  if (table.subject[row] === '') return 'no_subject';
  if (Number.isNaN(table.time[row])) return 'no_time';
  if (Number.isNaN(table.response[row])) return 'no_response';
  if (table.group && table.group[row] === '') return 'no_group';
  return null;
}

function refuseUnlessFinite(table: LongTable, row: number): void {
  for (const column of ['time', 'response'] as const) {
    const value = table[column][row]!;
    const line = lineOf(table, row);
    if (!Number.isFinite(value)) throw new StatsError('infinite_value', { column, line });
    if (Math.abs(value) > LARGEST) throw new StatsError('out_of_scale', { column, line, value });
  }
}

function refuseVanishing(table: LongTable, used: readonly number[], column: 'time' | 'response') {
  let largest = 0;
  let at = 0;
  for (const row of used) {
    const size = Math.abs(table[column][row]!);
    if (size > largest) {
      largest = size;
      at = row;
    }
  }
  if (largest > 0 && largest < SMALLEST) {
    const value = table[column][at]!;
    throw new StatsError('out_of_scale', { column, line: lineOf(table, at), value });
  }
}

/** Sorts positions from … to − 1 of `row` by time; equal times stay in file order. Most files are sorted already. */
function sortByTime(row: Int32Array, from: number, to: number, time: Float64Array): void {
  let sorted = true;
  for (let k = from + 1; k < to && sorted; k++) sorted = time[row[k - 1]!]! <= time[row[k]!]!;
  if (sorted) return;
  row.subarray(from, to).sort((a, b) => time[a]! - time[b]! || a - b);
}

function levelsOfSubjects(
  table: LongTable,
  group: readonly string[],
  used: readonly number[],
  subjectOf: Int32Array,
  subjects: readonly string[],
): { levels: string[]; level: Int32Array } {
  const own: (string | undefined)[] = new Array(subjects.length).fill(undefined);
  used.forEach((row, k) => {
    const i = subjectOf[k]!;
    const value = group[row]!;
    const first = own[i];
    if (first === undefined) own[i] = value;
    else if (first !== value) {
      const parameters = { subject: subjects[i]!, first, second: value, line: lineOf(table, row) };
      throw new StatsError('two_levels', parameters);
    }
  });
  const levels = [...new Set(own as string[])].sort();
  if (levels.length < 2) throw new StatsError('one_level', { level: levels[0] ?? '' });
  const index = new Map(levels.map((name, k) => [name, k]));
  return { levels, level: Int32Array.from(own, (name) => index.get(name as string)!) };
}

/**
 * Groups the complete rows of a long table by subject.
 *
 * A row without subject, time, response or (where in use) group is left out and listed with its reason.
 *
 * @throws StatsError column_lengths, infinite_value, out_of_scale, no_usable_rows, two_levels, one_level
 */
export function groupBySubject(table: LongTable): GroupedTable {
  const rows = table.subject.length;
  const lengths = [table.time, table.response, table.group, table.line];
  if (lengths.some((column) => column !== undefined && column.length !== rows)) {
    throw new StatsError('column_lengths', {});
  }
  const dropped: DroppedRow[] = [];
  const used: number[] = [];
  for (let row = 0; row < rows; row++) {
    const reason = missingFrom(table, row);
    if (reason) dropped.push({ line: lineOf(table, row), reason });
    else {
      refuseUnlessFinite(table, row);
      used.push(row);
    }
  }
  if (used.length === 0) throw new StatsError('no_usable_rows', { rows });
  refuseVanishing(table, used, 'time');
  refuseVanishing(table, used, 'response');

  const indexOf = new Map<string, number>();
  const subjects: string[] = [];
  const counts: number[] = [];
  const subjectOf = new Int32Array(used.length);
  used.forEach((row, k) => {
    const code = table.subject[row]!;
    let i = indexOf.get(code);
    if (i === undefined) {
      i = subjects.length;
      indexOf.set(code, i);
      subjects.push(code);
      counts.push(0);
    }
    subjectOf[k] = i;
    counts[i]! += 1;
  });
  const start = new Int32Array(subjects.length + 1);
  counts.forEach((count, i) => {
    start[i + 1] = start[i]! + count;
  });
  const next = start.slice(0, subjects.length);
  const row = new Int32Array(used.length);
  used.forEach((position, k) => {
    const i = subjectOf[k]!;
    row[next[i]!] = position;
    next[i]! += 1;
  });
  for (let i = 0; i < subjects.length; i++) sortByTime(row, start[i]!, start[i + 1]!, table.time);

  const grouping = table.group
    ? levelsOfSubjects(table, table.group, used, subjectOf, subjects)
    : { levels: null, level: null };
  return {
    rows,
    dropped,
    subjects,
    start,
    time: Float64Array.from(row, (position) => table.time[position]!),
    response: Float64Array.from(row, (position) => table.response[position]!),
    levels: grouping.levels,
    level: grouping.level,
    row,
  };
}
