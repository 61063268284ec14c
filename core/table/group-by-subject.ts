import { StatsError } from '../errors.ts';
import type { DroppedRow, DropReason, GroupedTable, LongTable } from './long-table.ts';

/** Within these bounds squares of slopes, and sums of them, stay inside double precision. */
const LARGEST = 1e70;
const SMALLEST = 1e-70;

function lineOf(table: LongTable, row: number): number {
  return table.line?.[row] ?? row + 2;
}

function outOfScale(table: LongTable, column: 'time' | 'response', row: number): StatsError {
  const value = table[column][row]!;
  const line = lineOf(table, row);
  if (!Number.isFinite(value)) return new StatsError('infinite_value', { column, line });
  return new StatsError('out_of_scale', { column, line, value });
}

/** The complete rows in file order, and the others with what they lack. */
interface Sifted {
  /** Positions of the used rows; only the first `count` are filled. */
  readonly used: Int32Array;
  readonly count: number;
  readonly dropped: readonly DroppedRow[];
}

function sift(table: LongTable): Sifted {
  const { subject, time, response, group } = table;
  const rows = subject.length;
  const used = new Int32Array(rows);
  const dropped: DroppedRow[] = [];
  let count = 0;
  let largestTime = 0;
  let largestResponse = 0;
  let timeAt = 0;
  let responseAt = 0;
  for (let row = 0; row < rows; row++) {
    const t = Math.abs(time[row]!);
    const y = Math.abs(response[row]!);
    let lacks: DropReason | null = null;
    if (subject[row] === '') lacks = 'no_subject';
    else if (Number.isNaN(t)) lacks = 'no_time';
    else if (Number.isNaN(y)) lacks = 'no_response';
    else if (group !== undefined && group[row] === '') lacks = 'no_group';
    if (lacks !== null) {
      dropped.push({ line: lineOf(table, row), reason: lacks });
      continue;
    }
    if (t > LARGEST) throw outOfScale(table, 'time', row);
    if (y > LARGEST) throw outOfScale(table, 'response', row);
    if (t > largestTime) {
      largestTime = t;
      timeAt = row;
    }
    if (y > largestResponse) {
      largestResponse = y;
      responseAt = row;
    }
    used[count] = row;
    count++;
  }
  if (count === 0) throw new StatsError('no_usable_rows', { rows });
  if (largestTime > 0 && largestTime < SMALLEST) throw outOfScale(table, 'time', timeAt);
  if (largestResponse > 0 && largestResponse < SMALLEST) {
    throw outOfScale(table, 'response', responseAt);
  }
  return { used, count, dropped };
}

/** Subjects in order of first appearance, and whose each used row is. */
interface Owners {
  readonly subjects: string[];
  /** `count` indices into `subjects`. */
  readonly owner: Int32Array;
  /** G + 1 offsets. */
  readonly start: Int32Array;
}

function ownersOf(table: LongTable, { used, count }: Sifted): Owners {
  const indexOf = new Map<string, number>();
  const subjects: string[] = [];
  const sizes: number[] = [];
  const owner = new Int32Array(count);
  let lastCode: string | null = null;
  let last = 0;
  for (let k = 0; k < count; k++) {
    const code = table.subject[used[k]!]!;
    // Files mostly list a subject's rows together.
    if (code !== lastCode) {
      const found = indexOf.get(code);
      last = found ?? subjects.length;
      lastCode = code;
      if (found === undefined) {
        indexOf.set(code, last);
        subjects.push(code);
        sizes.push(0);
      }
    }
    owner[k] = last;
    sizes[last]! += 1;
  }
  const start = new Int32Array(subjects.length + 1);
  for (let i = 0; i < sizes.length; i++) start[i + 1] = start[i]! + sizes[i]!;
  return { subjects, owner, start };
}

/** Positions of the used rows by subject and time. */
function arrange(table: LongTable, { used, count }: Sifted, { owner, start }: Owners): Int32Array {
  const next = start.slice();
  const row = new Int32Array(count);
  for (let k = 0; k < count; k++) {
    const i = owner[k]!;
    row[next[i]!] = used[k]!;
    next[i]! += 1;
  }
  for (let i = 0; i < start.length - 1; i++) {
    sortByTime(row, start[i]!, start[i + 1]!, table.time);
  }
  return row;
}

function pick(column: Float64Array, row: Int32Array): Float64Array {
  const picked = new Float64Array(row.length);
  for (let k = 0; k < row.length; k++) picked[k] = column[row[k]!]!;
  return picked;
}

/** Sorts positions from … to − 1 of `row` by time; equal times stay in file order. Most files are sorted already. */
function sortByTime(row: Int32Array, from: number, to: number, time: Float64Array): void {
  let sorted = true;
  for (let k = from + 1; k < to && sorted; k++) sorted = time[row[k - 1]!]! <= time[row[k]!]!;
  if (sorted) return;
  row.subarray(from, to).sort((a, b) => time[a]! - time[b]! || a - b);
}

/** The levels in use and the level of each subject; rows are looked at in file order. */
function levelsOf(
  table: LongTable,
  group: readonly string[],
  { used, count }: Sifted,
  { subjects, owner }: Owners,
): { levels: string[]; level: Int32Array } {
  const own: string[] = new Array<string>(subjects.length).fill('');
  for (let k = 0; k < count; k++) {
    const row = used[k]!;
    const i = owner[k]!;
    const value = group[row]!;
    const first = own[i]!;
    if (first === '') own[i] = value;
    else if (first !== value) {
      const parameters = { subject: subjects[i]!, first, second: value, line: lineOf(table, row) };
      throw new StatsError('two_levels', parameters);
    }
  }
  const levels = [...new Set(own)].sort();
  if (levels.length < 2) throw new StatsError('one_level', { level: levels[0] ?? '' });
  const index = new Map(levels.map((name, k) => [name, k]));
  return { levels, level: Int32Array.from(own, (name) => index.get(name)!) };
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
  const sifted = sift(table);
  const owners = ownersOf(table, sifted);
  const row = arrange(table, sifted, owners);
  const grouping = table.group
    ? levelsOf(table, table.group, sifted, owners)
    : { levels: null, level: null };
  return {
    rows,
    dropped: sifted.dropped,
    subjects: owners.subjects,
    start: owners.start,
    time: pick(table.time, row),
    response: pick(table.response, row),
    levels: grouping.levels,
    level: grouping.level,
    row,
  };
}
