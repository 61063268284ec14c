/** Whether the content of a reading can stand for its measure. Pure. */
import type { Measure } from '../../../database/entities/index.ts';
import { NOT_DONE_REASONS } from '../../../database/entities/index.ts';

/** As it comes in: exactly one of the four is given. */
export interface ReadingInput {
  value?: number | null;
  choice?: string | null;
  limit?: { sign: '<' | '>'; value: number } | null;
  notDone?: string | null;
}

/** As it is stored. */
export interface ReadingCells {
  value: number | null;
  choice: string | null;
  limitSign: '<' | '>' | null;
  limitValue: number | null;
  notDone: (typeof NOT_DONE_REASONS)[number] | null;
}

export type ContentFault =
  | 'reading_one_content'
  | 'reading_not_finite'
  | 'reading_not_positive'
  | 'reading_not_count'
  | 'reading_not_yes_no'
  | 'reading_choice_unknown'
  | 'reading_needs_number'
  | 'reading_impossible'
  | 'reading_not_done_reason';

export type CheckedContent =
  | { ok: true; cells: ReadingCells; implausible: boolean }
  | { ok: false; fault: ContentFault; params: Record<string, string | number> };

const refuse = (
  fault: ContentFault,
  params: Record<string, string | number> = {},
): CheckedContent => ({ ok: false, fault, params });

/** Takes a reading as it comes in; an implausible value passes and is marked, an impossible one does not. */
export function checkContent(measure: Measure, input: ReadingInput): CheckedContent {
  const { value = null, choice = null, limit = null, notDone = null } = input;
  const given = [value, choice, limit, notDone].filter((part) => part !== null);
  if (given.length !== 1) {
    return refuse('reading_one_content', { measure: measure.label });
  }
  if (notDone !== null) {
    const reason = NOT_DONE_REASONS.find((known) => known === notDone);
    return reason
      ? { ok: true, cells: { ...NOTHING, notDone: reason }, implausible: false }
      : refuse('reading_not_done_reason', { given: notDone });
  }
  if (choice !== null) {
    const known = measure.nature === 'choice' && measure.choices?.some((c) => c.code === choice);
    return known
      ? { ok: true, cells: { ...NOTHING, choice }, implausible: false }
      : refuse('reading_choice_unknown', { measure: measure.label, given: choice });
  }
  const number = limit?.value ?? value;
  if (measure.nature === 'choice' || number === null) {
    return refuse('reading_choice_unknown', { measure: measure.label, given: String(number) });
  }
  const fault = faultOfNumber(measure, number, limit !== null);
  if (fault) {
    return fault;
  }
  const cells: ReadingCells = limit
    ? { ...NOTHING, limitSign: limit.sign, limitValue: number }
    : { ...NOTHING, value: number };
  return { ok: true, cells, implausible: limit === null && isImplausible(measure, number) };
}

const NOTHING: ReadingCells = {
  value: null,
  choice: null,
  limitSign: null,
  limitValue: null,
  notDone: null,
};

function faultOfNumber(measure: Measure, number: number, censored: boolean): CheckedContent | null {
  const at = { measure: measure.label, given: number };
  if (!Number.isFinite(number)) {
    return refuse('reading_not_finite', { measure: measure.label });
  }
  if (measure.nature === 'yes_no') {
    if (censored) {
      return refuse('reading_needs_number', at);
    }
    return number === 0 || number === 1 ? null : refuse('reading_not_yes_no', at);
  }
  if (measure.nature === 'positive' && number <= 0) {
    return refuse('reading_not_positive', at);
  }
  if (measure.nature === 'count' && (number < 0 || !Number.isInteger(number))) {
    return refuse('reading_not_count', at);
  }
  const tooLow = measure.impossibleLow !== null && number < measure.impossibleLow;
  const tooHigh = measure.impossibleHigh !== null && number > measure.impossibleHigh;
  if (tooLow || tooHigh) {
    return refuse('reading_impossible', {
      ...at,
      low: measure.impossibleLow ?? '',
      high: measure.impossibleHigh ?? '',
    });
  }
  return null;
}

/** Outside the plausible range of its measure: to be read again, or explained. */
export function isImplausible(
  measure: Pick<Measure, 'plausibleLow' | 'plausibleHigh'>,
  value: number | null,
): boolean {
  if (value === null) {
    return false;
  }
  return (
    (measure.plausibleLow !== null && value < measure.plausibleLow) ||
    (measure.plausibleHigh !== null && value > measure.plausibleHigh)
  );
}
