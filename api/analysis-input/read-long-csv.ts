import { createHash } from 'node:crypto';
import papaparse from 'papaparse';
import type { LongTable } from '../../core/index.ts';
import { decodeText } from './decode-text.ts';
import { LongCsvError } from './long-csv-error.ts';
import { isMissing, parseNumber } from './parse-number.ts';

/** The columns of a CSV that are looked at; no other is. */
export interface LongCsvColumns {
  readonly subject: string;
  readonly time: string;
  readonly response: string;
  readonly group?: string;
}

export interface LongCsv {
  readonly table: LongTable;
  /** SHA-256 of the bytes, in hexadecimal. */
  readonly sha256: string;
}

const DELIMITERS = [',', ';', '\t'] as const;

interface Lines {
  readonly header: readonly string[];
  readonly headerLine: number;
  readonly rows: readonly string[][];
  /** The file's line each row begins on. */
  readonly line: readonly number[];
}

function namesOf(columns: LongCsvColumns): string[] {
  const names = [columns.subject, columns.time, columns.response];
  return columns.group === undefined ? names : [...names, columns.group];
}

function fieldsOf(text: string, delimiter: string): string[] {
  const { data } = papaparse.parse<string[]>(text, { delimiter, newline: '\n', preview: 1 });
  return (data[0] ?? []).map((name) => name.trim());
}

/** The delimiter under which most of the wanted columns stand in the header, then the one that gives most fields. */
function findDelimiter(headerText: string, wanted: readonly string[]): string {
  let best = { delimiter: DELIMITERS[0] as string, found: -1, fields: 0 };
  for (const delimiter of DELIMITERS) {
    const fields = fieldsOf(headerText, delimiter);
    const found = wanted.filter((name) => fields.includes(name)).length;
    if (found > best.found || (found === best.found && fields.length > best.fields)) {
      best = { delimiter, found, fields: fields.length };
    }
  }
  return best.delimiter;
}

function isBlank(row: readonly string[]): boolean {
  return row.length === 1 && row[0]!.trim() === '';
}

function breaksIn(row: readonly string[]): number {
  let breaks = 0;
  for (const field of row) {
    for (let at = field.indexOf('\n'); at !== -1; at = field.indexOf('\n', at + 1)) breaks++;
  }
  return breaks;
}

/** Splits the text into rows and keeps the line each begins on; blank lines are passed over. */
function splitLines(text: string, delimiter: string): Lines {
  const { data, errors } = papaparse.parse<string[]>(text, { delimiter, newline: '\n' });
  // The first problem of a row is its cause: a stray quote also leaves the field without an end.
  const problems = new Map([...errors].reverse().map((error) => [error.row ?? 0, error.code]));
  const rows: string[][] = [];
  const line: number[] = [];
  let header: string[] | null = null;
  let headerLine = 1;
  let at = 1;
  data.forEach((row, k) => {
    const problem = problems.get(k);
    if (problem === 'MissingQuotes') throw new LongCsvError('open_quote', { line: at }, undefined);
    if (problem === 'InvalidQuotes') throw new LongCsvError('stray_quote', { line: at }, undefined);
    if (!isBlank(row)) {
      if (header === null) {
        header = row.map((name) => name.trim());
        headerLine = at;
      } else {
        if (row.length !== header.length) {
          const parameters = { fields: row.length, header: header.length };
          throw new LongCsvError('ragged', { line: at }, parameters);
        }
        rows.push(row);
        line.push(at);
      }
    }
    at += 1 + breaksIn(row);
  });
  return { header: header ?? [], headerLine, rows, line };
}

function positionOf(name: string, { header, headerLine }: Lines): number {
  const wanted = name.trim();
  const position = header.indexOf(wanted);
  const place = { line: headerLine, column: name };
  if (position === -1) throw new LongCsvError('missing_column', place, { names: header });
  if (header.lastIndexOf(wanted) !== position) {
    throw new LongCsvError('repeated_column', place, undefined);
  }
  return position;
}

/** Text as written, '' where it is missing. */
function textColumn(lines: Lines, position: number): string[] {
  return lines.rows.map((row) => (isMissing(row[position]!) ? '' : row[position]!));
}

function numberColumn(lines: Lines, name: string, position: number, comma: boolean): Float64Array {
  const column = new Float64Array(lines.rows.length);
  for (let k = 0; k < column.length; k++) {
    const place = { line: lines.line[k]!, column: name };
    column[k] = parseNumber(lines.rows[k]![position]!, comma, place);
  }
  return column;
}

/**
 * Reads a long CSV with a header (RFC 4180; UTF-8 with or without byte-order mark; comma, semicolon or tab, found
 * by itself; decimal comma with semicolons). Empty, NA, N/A, NaN, null and . are missing. Subject and group stay
 * text as written.
 *
 * @throws LongCsvError with the line or column and the mend
 */
export function readLongCsv(bytes: Uint8Array, columns: LongCsvColumns): LongCsv {
  const text = decodeText(bytes);
  const wanted = namesOf(columns);
  const firstLine = text.trimStart().split('\n', 1)[0] ?? '';
  const delimiter = findDelimiter(firstLine, wanted);
  const lines = splitLines(text, delimiter);
  const [subject, time, response] = [columns.subject, columns.time, columns.response].map((name) =>
    positionOf(name, lines),
  ) as [number, number, number];
  const group = columns.group === undefined ? null : positionOf(columns.group, lines);
  if (lines.rows.length === 0) throw new LongCsvError('no_rows', {}, undefined);
  const comma = delimiter === ';';
  const table: LongTable = {
    subject: textColumn(lines, subject),
    time: numberColumn(lines, columns.time, time, comma),
    response: numberColumn(lines, columns.response, response, comma),
    line: Int32Array.from(lines.line),
    ...(group === null ? {} : { group: textColumn(lines, group) }),
  };
  return { table, sha256: createHash('sha256').update(bytes).digest('hex') };
}
