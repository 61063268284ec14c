/** The mapping as the form holds it, a meaning for each column, and as the server takes it. */
import type { FieldPath } from 'react-hook-form';
import type { FixedOrColumn, ImportMapping, ImportView } from '../../../api/contracts/imports.ts';
import { words } from '../../words/en.ts';

export const meanings = [
  'none',
  'subject',
  'value',
  'date',
  'days',
  'visit',
  'replicate',
  'site',
] as const;
export type Meaning = (typeof meanings)[number];
export type DateOrder = 'year-month-day' | 'day-month-year' | 'month-day-year';

export const newFacts = ['site', 'consentVersion', 'consentDate', 'baselineDate'] as const;
export type NewFact = (typeof newFacts)[number];
type FactValue = { from: 'fixed' | 'column'; value: string; column: string };

export type MappingValues = {
  columns: { name: string; meaning: Meaning; order: DateOrder | '' }[];
  decimal: '.' | ',';
  enrol: 'refuse' | 'enrol';
  facts: Record<NewFact, FactValue>;
  factOrder: DateOrder | '';
};

const NEEDS = words.imports.needs;
const WHEN: readonly Meaning[] = ['date', 'days', 'visit'];

export function startValues(view: ImportView, sites: readonly { code: string }[]): MappingValues {
  const mapping = view.mapping ?? view.suggestedMapping ?? {};
  const meaningOf = (name: string): Meaning => {
    if (mapping.subject === name) return 'subject';
    if (mapping.value === name) return 'value';
    if (mapping.replicate === name) return 'replicate';
    if (mapping.site === name) return 'site';
    return mapping.when?.column === name ? mapping.when.kind : 'none';
  };
  const held = mapping.newSubjects ?? null;
  const only = sites.length === 1 ? (sites[0]?.code ?? '') : '';
  const factOf = (fact: NewFact): FactValue => {
    const source = held?.[fact];
    if (!source) return { from: 'fixed', value: fact === 'site' ? only : '', column: '' };
    return source.from === 'fixed'
      ? { from: 'fixed', value: source.value, column: '' }
      : { from: 'column', value: '', column: source.column };
  };
  return {
    columns: view.columns.map(({ name }) => ({
      name,
      meaning: meaningOf(name),
      order:
        mapping.when?.kind === 'date' && mapping.when.column === name ? mapping.when.order : '',
    })),
    decimal: mapping.decimal ?? '.',
    enrol: held ? 'enrol' : 'refuse',
    facts: {
      site: factOf('site'),
      consentVersion: factOf('consentVersion'),
      consentDate: factOf('consentDate'),
      baselineDate: factOf('baselineDate'),
    },
    factOrder: held?.order ?? '',
  };
}

export type Fault = { path: FieldPath<MappingValues>; message: string };
type Read = { mapping: ImportMapping; faults: null } | { mapping: null; faults: Fault[] };

/** Reads the form; says what is missing at the field that mends it. */
export function readMapping(values: MappingValues, per: 'visit' | 'subject'): Read {
  const faults: Fault[] = [];
  const fault = (path: FieldPath<MappingValues>, message: string) => faults.push({ path, message });
  const columnsOf = (...wanted: Meaning[]) =>
    values.columns.flatMap((column, index) =>
      wanted.includes(column.meaning) ? [{ ...column, index }] : [],
    );
  const one = (wanted: readonly Meaning[], missing: string | null) => {
    const found = columnsOf(...wanted);
    for (const extra of found.slice(1)) fault(`columns.${extra.index}.meaning`, NEEDS.once);
    if (found.length === 0 && missing) fault('columns.0.meaning', missing);
    return found[0] ?? null;
  };
  const subject = one(['subject'], NEEDS.subject);
  const value = one(['value'], NEEDS.value);
  const when = per === 'visit' ? one(WHEN, NEEDS.when) : null;
  const replicate = one(['replicate'], null);
  const site = one(['site'], null);
  if (when?.meaning === 'date' && when.order === '') {
    fault(`columns.${when.index}.order`, NEEDS.order);
  }
  const newSubjects = values.enrol === 'enrol' ? readFacts(values, fault) : null;
  if (faults.length > 0 || !subject || !value) return { mapping: null, faults };
  return {
    faults: null,
    mapping: {
      subject: subject.name,
      value: value.name,
      when: when ? whenOf(when) : null,
      replicate: replicate?.name ?? null,
      site: site?.name ?? null,
      decimal: values.decimal,
      newSubjects,
    },
  };
}

function whenOf(column: MappingValues['columns'][number]): ImportMapping['when'] {
  if (column.meaning === 'days') return { kind: 'days', column: column.name };
  if (column.meaning === 'visit') return { kind: 'visit', column: column.name };
  return { kind: 'date', column: column.name, order: column.order || 'year-month-day' };
}

function readFacts(
  values: MappingValues,
  fault: (path: FieldPath<MappingValues>, message: string) => void,
): ImportMapping['newSubjects'] {
  const read = (fact: NewFact): FixedOrColumn => {
    const { from, value, column } = values.facts[fact];
    if (from === 'column') {
      if (!column) fault(`facts.${fact}.column`, NEEDS.fact);
      return { from, column };
    }
    if (!value.trim()) fault(`facts.${fact}.value`, NEEDS.fact);
    return { from, value: value.trim() };
  };
  const facts = {
    site: read('site'),
    consentVersion: read('consentVersion'),
    consentDate: read('consentDate'),
    baselineDate: read('baselineDate'),
  };
  const datesInColumns =
    facts.consentDate.from === 'column' || facts.baselineDate.from === 'column';
  if (datesInColumns && values.factOrder === '') fault('factOrder', NEEDS.order);
  return { ...facts, order: values.factOrder || 'year-month-day' };
}
