import { type CsvPlace, LongCsvError } from './long-csv-error.ts';

/** Cells that say "missing". */
const MISSING = new Set(['', 'NA', 'N/A', 'NaN', 'null', '.']);

const PLAIN = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const DECIMAL_COMMA = /^([+-]?\d*),(\d+(?:[eE][+-]?\d+)?)$/;
const INFINITE = /^[+-]?inf(?:inity)?$/i;

/** Whether a cell says that its value is missing. */
export function isMissing(cell: string): boolean {
  return MISSING.has(cell.trim());
}

/**
 * The number in a cell, NaN where it is missing.
 *
 * @throws LongCsvError not_a_number, infinite, overflow
 */
export function parseNumber(cell: string, decimalComma: boolean, place: CsvPlace): number {
  const text = cell.trim();
  if (MISSING.has(text)) return Number.NaN;
  const plain = decimalComma ? text.replace(DECIMAL_COMMA, '$1.$2') : text;
  if (INFINITE.test(plain)) throw new LongCsvError('infinite', place, { text });
  if (!PLAIN.test(plain)) throw new LongCsvError('not_a_number', place, { text });
  const value = Number(plain);
  if (!Number.isFinite(value)) throw new LongCsvError('overflow', place, { text });
  return value;
}
