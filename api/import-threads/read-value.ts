/** What a value cell means for the measure: a number, a limit, a yes-no or a choice. */
import { isFormula, isMissing, type Read, readNumber, refuse } from './cells.ts';

export type MeasureForm = {
  nature: 'continuous' | 'positive' | 'count' | 'yes_no' | 'choice';
  choices: string[];
};

export type CellValue = {
  value: number | null;
  choice: string | null;
  limitSign: '<' | '>' | null;
  limitValue: number | null;
};

const NONE: CellValue = { value: null, choice: null, limitSign: null, limitValue: null };
const YES = new Set(['1', 'yes', 'y', 'true']);
const NO = new Set(['0', 'no', 'n', 'false']);

export function readValue(
  text: string,
  measure: MeasureForm,
  decimal: '.' | ',',
  column: string,
): Read<CellValue> {
  if (isMissing(text)) return refuse('row_value_missing', { column });
  if (measure.nature === 'yes_no') return readYesNo(text, column);
  if (measure.nature === 'choice') return readChoice(text, measure.choices, column);
  if (isFormula(text)) return refuse('row_formula', { column, value: text });
  const sign = text[0] === '<' || text[0] === '>' ? text[0] : null;
  const number = readNumber(sign ? text.slice(1).trim() : text, decimal, column);
  if (!number.ok) return number;
  const value = number.value;
  if (measure.nature === 'positive' && value <= 0) {
    return refuse('row_value_not_positive', { column, value: text });
  }
  if (measure.nature === 'count' && (value < 0 || !Number.isInteger(value))) {
    return refuse('row_value_not_count', { column, value: text });
  }
  if (sign) return { ok: true, value: { ...NONE, limitSign: sign, limitValue: value } };
  return { ok: true, value: { ...NONE, value } };
}

function readYesNo(text: string, column: string): Read<CellValue> {
  const word = text.toLowerCase();
  if (YES.has(word)) return { ok: true, value: { ...NONE, value: 1 } };
  if (NO.has(word)) return { ok: true, value: { ...NONE, value: 0 } };
  return refuse('row_value_yes_no', { column, value: text });
}

function readChoice(text: string, choices: string[], column: string): Read<CellValue> {
  if (/^[<>]/.test(text)) return refuse('row_limit_of_choice', { column, value: text });
  if (!choices.includes(text)) {
    return refuse('row_value_choice', { column, value: text, choices: choices.join(', ') });
  }
  return { ok: true, value: { ...NONE, choice: text } };
}
