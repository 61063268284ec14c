/** One row of the file by the mapping: what it says, or why it can't be used. */
import type { FixedOrColumn, ImportMapping } from '../contracts/imports.ts';
import {
  CODE_FORM,
  type DateOrder,
  isFormula,
  isMissing,
  type Read,
  type Refusal,
  readDate,
  readDay,
  readReplicate,
  refuse,
} from './cells.ts';
import { type CellValue, type MeasureForm, readValue } from './read-value.ts';

export type NewSubjectFacts = {
  site: string;
  consentVersion: string;
  consentDate: string;
  baselineDate: string;
};

export type RowFacts = CellValue & {
  day: number | null;
  date: string | null;
  visit: string | null;
  replicate: number;
  site: string | null;
  newSubject: NewSubjectFacts | null;
  /** Why the row could not enrol its subject; it counts only where the subject turns out to be new. */
  newSubjectRefusal: Refusal | null;
};

export type ReadRow = {
  line: number;
  subject: string;
  valueText: string;
} & ({ facts: RowFacts; refusal: null } | { facts: null; refusal: Refusal });

export type RowReader = (cells: string[], line: number) => ReadRow;

/** @throws Error when the mapping names a column that the file does not have. */
export function makeRowReader(
  header: string[],
  mapping: ImportMapping,
  measure: MeasureForm & { per: 'visit' | 'subject' },
): RowReader {
  const cellOf = (name: string): ((cells: string[]) => string) => {
    const index = header.indexOf(name);
    if (index < 0) throw new Error(`no column ${name}`);
    return (cells) => (cells[index] ?? '').trim();
  };
  const subjectCell = cellOf(mapping.subject);
  const valueCell = cellOf(mapping.value);
  const when = whenReader(mapping, measure.per, cellOf);
  const replicateName = mapping.replicate;
  const replicateCell = replicateName === null ? null : cellOf(replicateName);
  const siteCell = mapping.site === null ? null : cellOf(mapping.site);
  const newSubject = newSubjectReader(mapping, cellOf);

  return (cells, line) => {
    const subject = subjectCell(cells);
    const valueText = valueCell(cells);
    const shown = { line, subject: clip(subject), valueText: clip(valueText) };
    const refused = (refusal: Refusal): ReadRow => ({ ...shown, facts: null, refusal });
    if (cells.length !== header.length) {
      const params = { cells: cells.length, columns: header.length };
      return refused({ code: 'row_ragged', params });
    }
    // What says "missing" in any cell can be nobody's code: the engine would leave its readings out.
    if (isMissing(subject)) {
      return refused({ code: 'row_subject_missing', params: { column: mapping.subject } });
    }
    if (isFormula(subject)) {
      return refused({
        code: 'row_formula',
        params: { column: mapping.subject, value: clip(subject) },
      });
    }
    if (!CODE_FORM.test(subject)) {
      const params = { column: mapping.subject, value: clip(subject) };
      return refused({ code: 'row_subject_form', params });
    }
    const time = when(cells);
    if (!time.ok) return refused(time.refusal);
    let replicate = 1;
    if (replicateCell && replicateName) {
      const read = readReplicate(replicateCell(cells), replicateName);
      if (!read.ok) return refused(read.refusal);
      replicate = read.value;
    }
    const value = readValue(valueText, measure, mapping.decimal, mapping.value);
    if (!value.ok) return refused(value.refusal);
    // What a new subject needs matters only where the subject is new: the judging step asks for it.
    const enrolment = newSubject ? newSubject(cells) : null;
    const site = siteCell ? siteCell(cells) : null;
    if (site === '') {
      return refused({ code: 'row_site_missing', params: { column: mapping.site ?? '' } });
    }
    return {
      ...shown,
      facts: {
        ...value.value,
        ...time.value,
        replicate,
        site,
        newSubject: enrolment?.ok ? enrolment.value : null,
        newSubjectRefusal: enrolment && !enrolment.ok ? enrolment.refusal : null,
      },
      refusal: null,
    };
  };
}

type When = { day: number | null; date: string | null; visit: string | null };

function whenReader(
  mapping: ImportMapping,
  per: 'visit' | 'subject',
  cellOf: (name: string) => (cells: string[]) => string,
): (cells: string[]) => Read<When> {
  const none: When = { day: null, date: null, visit: null };
  const when = mapping.when;
  if (per === 'subject' || when === null) return () => ({ ok: true, value: none });
  const cell = cellOf(when.column);
  return (cells) => {
    const text = cell(cells);
    if (when.kind === 'visit') {
      if (text === '') return refuse('row_visit_missing', { column: when.column });
      return { ok: true, value: { ...none, visit: text } };
    }
    if (text === '') return refuse('row_date_missing', { column: when.column });
    if (when.kind === 'days') {
      const day = readDay(text, when.column);
      return day.ok ? { ok: true, value: { ...none, day: day.value } } : day;
    }
    const date = readDate(text, when.order, when.column);
    return date.ok ? { ok: true, value: { ...none, date: date.value } } : date;
  };
}

function newSubjectReader(
  mapping: ImportMapping,
  cellOf: (name: string) => (cells: string[]) => string,
): ((cells: string[]) => Read<NewSubjectFacts>) | null {
  const wanted = mapping.newSubjects;
  if (!wanted) return null;
  const text = (source: FixedOrColumn) => {
    if (source.from === 'fixed') return { name: '', read: () => source.value };
    return { name: source.column, read: cellOf(source.column) };
  };
  const [site, version, consent, baseline] = [
    text(wanted.site),
    text(wanted.consentVersion),
    text(wanted.consentDate),
    text(wanted.baselineDate),
  ];
  return (cells) => {
    const siteText = site.read(cells);
    if (siteText === '') return refuse('row_site_missing', { column: site.name });
    const versionText = version.read(cells);
    if (versionText === '' || versionText.length > 32 || isFormula(versionText)) {
      return refuse('row_consent_version', { column: version.name, value: clip(versionText) });
    }
    const order = (source: FixedOrColumn): DateOrder =>
      source.from === 'fixed' ? 'year-month-day' : wanted.order;
    const consentDate = readDate(consent.read(cells), order(wanted.consentDate), consent.name);
    if (!consentDate.ok) return consentDate;
    const baselineDate = readDate(baseline.read(cells), order(wanted.baselineDate), baseline.name);
    if (!baselineDate.ok) return baselineDate;
    return {
      ok: true,
      value: {
        site: siteText,
        consentVersion: versionText,
        consentDate: consentDate.value,
        baselineDate: baselineDate.value,
      },
    };
  };
}

function clip(text: string): string {
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}
