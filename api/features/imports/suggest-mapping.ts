/** A first guess at the mapping from the names of the columns; the person sees it and decides. */
import type { ImportMapping } from '../../contracts/imports.ts';

type Column = { name: string; samples: string[] };

const SUBJECT = /^(subject|subject[ _-]?(id|code)|participant|id|code)$/i;
const DATE = /date|taken|drawn|measured on/i;
const DAYS = /^(day|days|study[ _-]?day|days since baseline)$/i;
const VISIT = /^(visit|visit[ _-]?name)$/i;
const REPLICATE = /^(replicate|repeat|rep)$/i;
const SITE = /^(site|site[ _-]?code|centre|center)$/i;
const VALUE = /^(value|result|reading|y)$/i;
const NUMBER = /^[<>]?\s*[+-]?\d+([.,]\d+)?$/;

/**
 * @param columns as found in the file
 * @param measure its short name and label: a column named like it holds the values
 */
export function suggestMapping(
  columns: Column[],
  measure: { shortName: string; label: string; per: 'visit' | 'subject' },
): Partial<ImportMapping> {
  const named = (pattern: RegExp) => columns.find((column) => pattern.test(column.name));
  const sameWord = (a: string, b: string) => fold(a) === fold(b);
  const subject = named(SUBJECT);
  const own = columns.find(
    (column) => sameWord(column.name, measure.shortName) || sameWord(column.name, measure.label),
  );
  const value = own ?? named(VALUE);
  const decimal = value?.samples.some((sample) => /^\S*\d,\d/.test(sample)) ? ',' : '.';
  const suggested: Partial<ImportMapping> = {
    replicate: named(REPLICATE)?.name ?? null,
    site: named(SITE)?.name ?? null,
    decimal,
    newSubjects: null,
  };
  if (subject) suggested.subject = subject.name;
  if (value?.samples.every((sample) => NUMBER.test(sample)) || own) suggested.value = value?.name;
  suggested.when = measure.per === 'subject' ? null : suggestWhen(named);
  return suggested;
}

/** The order of day and month is never guessed: a date column is offered as year-month-day only if it is. */
function suggestWhen(named: (pattern: RegExp) => Column | undefined): ImportMapping['when'] {
  const days = named(DAYS);
  if (days?.samples.every((sample) => /^[+-]?\d+$/.test(sample))) {
    return { kind: 'days', column: days.name };
  }
  const date = named(DATE);
  if (date?.samples.every((sample) => /^\d{4}-\d{1,2}-\d{1,2}$/.test(sample))) {
    return { kind: 'date', column: date.name, order: 'year-month-day' };
  }
  const visit = named(VISIT);
  return visit ? { kind: 'visit', column: visit.name } : null;
}

function fold(text: string): string {
  return text.toLowerCase().replace(/[^a-z0-9]/g, '');
}
