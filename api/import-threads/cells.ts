/** Reads one cell each: numbers, days, dates. A refusal is a code with what fills its sentence. */
import type { Params } from './file-problem.ts';

export type Refusal = { code: RowCode; params: Params };
export type Read<T> = { ok: true; value: T } | { ok: false; refusal: Refusal };

/** Reasons a row can be refused for what stands in its own cells. */
export const rowCellCodes = [
  'row_ragged',
  'row_formula',
  'row_subject_missing',
  'row_subject_form',
  'row_value_missing',
  'row_value_comma',
  'row_value_text',
  'row_value_size',
  'row_value_not_positive',
  'row_value_not_count',
  'row_value_yes_no',
  'row_value_choice',
  'row_limit_of_choice',
  'row_day_form',
  'row_date_missing',
  'row_date_form',
  'row_date_impossible',
  'row_visit_missing',
  'row_replicate_form',
  'row_site_missing',
  'row_consent_version',
] as const;
export type RowCode = (typeof rowCellCodes)[number];

const MISSING = new Set(['', 'na', 'n/a', 'nan', 'null', '.']);
const NUMBER = /^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$/;
export const CODE_FORM = /^[A-Za-z0-9][A-Za-z0-9._-]{0,31}$/;

export function isMissing(text: string): boolean {
  return MISSING.has(text.toLowerCase());
}

/** A cell a spreadsheet would calculate. A signed number is none. */
export function isFormula(text: string): boolean {
  return /^[=@]/.test(text) || (/^[+-]/.test(text) && !NUMBER.test(text.replace(',', '.')));
}

export function refuse(code: RowCode, params: Params = {}): { ok: false; refusal: Refusal } {
  return { ok: false, refusal: { code, params } };
}

export function readNumber(text: string, decimal: '.' | ',', column: string): Read<number> {
  const stray = decimal === '.' ? ',' : '.';
  if (text.includes(stray) && NUMBER.test(text.replace(stray, '.'))) {
    return refuse('row_value_comma', { column, value: text, mark: stray });
  }
  const plain = decimal === ',' ? text.replace(',', '.') : text;
  if (!NUMBER.test(plain)) return refuse('row_value_text', { column, value: text });
  const number = Number(plain);
  if (!Number.isFinite(number) || Math.abs(number) > 1e15) {
    return refuse('row_value_size', { column, value: text });
  }
  // Minus zero would make two texts of one value.
  return { ok: true, value: number === 0 ? 0 : number };
}

export function readDay(text: string, column: string): Read<number> {
  if (!/^[+-]?\d{1,5}(\.0*)?$/.test(text)) return refuse('row_day_form', { column, value: text });
  return { ok: true, value: Number(text) + 0 };
}

export function readReplicate(text: string, column: string): Read<number> {
  if (!/^\d{1,3}$/.test(text) || Number(text) < 1) {
    return refuse('row_replicate_form', { column, value: text });
  }
  return { ok: true, value: Number(text) };
}

export type DateOrder = 'year-month-day' | 'day-month-year' | 'month-day-year';

const PARTS = /^(\d{1,4})[-/.](\d{1,2})[-/.](\d{1,4})$/;

/** @returns the date as yyyy-mm-dd. The order is what the person said; it is never guessed. */
export function readDate(text: string, order: DateOrder, column: string): Read<string> {
  const match = PARTS.exec(text);
  const form = () => refuse('row_date_form', { column, value: text, order });
  if (!match) return form();
  const [, one = '', two = '', three = ''] = match;
  const [yearText, monthText, dayText] =
    order === 'year-month-day'
      ? [one, two, three]
      : order === 'day-month-year'
        ? [three, two, one]
        : [three, one, two];
  if (yearText?.length !== 4 || (dayText ?? '').length > 2 || (monthText ?? '').length > 2) {
    return form();
  }
  const [year, month, day] = [Number(yearText), Number(monthText), Number(dayText)];
  const date = new Date(Date.UTC(year, month - 1, day));
  const real =
    year >= 1900 &&
    date.getUTCFullYear() === year &&
    date.getUTCMonth() === month - 1 &&
    date.getUTCDate() === day;
  if (!real) return refuse('row_date_impossible', { column, value: text, order });
  return { ok: true, value: date.toISOString().slice(0, 10) };
}
