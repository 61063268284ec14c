/** Each subject's own line; those without one stand with why not. */
import { useMemo } from 'react';
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import {
  decimalsForError,
  formatCount,
  formatError,
  formatEstimate,
  formatLoose,
  formatNumber,
} from '../../components/numbers.ts';
import { Section } from '../../components/page.tsx';
import { notFittedReason } from '../../words/advice.ts';
import { slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { groupsOf } from './headline.ts';
import type { RecordPartProps } from './part-props.ts';
import { recordFile } from './source.ts';

const text = words.records;
const names = text.subjectColumns;
/** By code: a list that begins with the steepest slope would rank people by chance. */
const BY_CODE = { id: 'code', down: false };

type Row = {
  id: string;
  code: string;
  group: string | null;
  n: number;
  slope: number | null;
  slopeSe: number | null;
  intercept: number | null;
  ended: string | null;
  why: string | null;
};

function rowsOf({ picture, result }: RecordDetail): Row[] {
  const own = new Map((result.per_subject?.lines ?? []).map((line) => [line.subject, line]));
  const why = new Map(
    (result.per_subject?.not_fitted ?? []).map((line) => [line.subject, notFittedReason(line)]),
  );
  return picture.subjects.map((subject) => {
    const line = own.get(subject.code);
    return {
      id: subject.id,
      code: subject.code,
      group: subject.group,
      n: subject.readings.length,
      slope: line?.slope ?? null,
      slopeSe: line?.slope_se ?? null,
      intercept: line?.intercept ?? null,
      ended: subject.ended?.word ?? null,
      why: why.get(subject.code) ?? null,
    };
  });
}

function columnsOf(record: RecordDetail, rows: readonly Row[]): Column<Row>[] {
  const unit = slopeUnit(record.measure.unit, record.specification.unit);
  const ofMeasure = record.measure.unit ?? undefined;
  const group: Column<Row>[] =
    groupsOf(record).length > 1
      ? [
          {
            id: 'group',
            heading: names.group,
            value: (row) => row.group,
            cell: (row) => <span className="whitespace-nowrap">{row.group}</span>,
          },
        ]
      : [];
  const stamp: Column<Row>[] = record.stamp
    ? [
        {
          id: 'stamp',
          heading: text.columns.stamp,
          exportHeading: 'stamp',
          value: () => record.stamp,
          cell: () => <strong className="text-13 text-flare-ink">{record.stamp}</strong>,
          fixed: true,
        },
      ]
    : [];
  // One count of decimals down a column, so that the points stand under each other.
  const errors = (record.result.per_subject?.lines ?? [])
    .map((line) => line.slope_se)
    .filter((error): error is number => error !== null && error > 0)
    .sort((a, b) => a - b);
  const decimals = decimalsForError(errors[Math.floor(errors.length / 2)]);
  const slope = (value: number | null) =>
    decimals === null ? formatLoose(value) : formatNumber(value, decimals);
  // A column that would be empty from top to bottom is left out.
  const filled = (id: 'ended' | 'why', heading: string): Column<Row>[] =>
    rows.some((row) => row[id] !== null) ? [{ id, heading, value: (row) => row[id] }] : [];
  return [
    {
      id: 'code',
      heading: names.code,
      value: (row) => row.code,
      cell: (row) => <span className="figure">{row.code}</span>,
    },
    ...group,
    {
      id: 'n',
      heading: names.n,
      value: (row) => row.n,
      cell: (row) => formatCount(row.n),
      numeric: true,
    },
    {
      id: 'slope',
      heading: names.slope,
      unit,
      value: (row) => row.slope,
      cell: (row) => slope(row.slope),
      numeric: true,
    },
    {
      id: 'slopeSe',
      heading: names.slopeSe,
      unit,
      value: (row) => row.slopeSe,
      cell: (row) => slope(row.slopeSe),
      numeric: true,
    },
    {
      id: 'intercept',
      heading: names.intercept,
      unit: ofMeasure,
      value: (row) => row.intercept,
      cell: (row) => formatNumber(row.intercept, record.measure.decimals + 1),
      numeric: true,
    },
    ...filled('ended', names.ended),
    ...filled('why', names.why),
    ...stamp,
  ];
}

export function SubjectTable({ record, picked, onPick }: RecordPartProps) {
  const rows = useMemo(() => rowsOf(record), [record]);
  const columns = useMemo(() => columnsOf(record, rows), [record, rows]);
  const own = record.result.per_subject;
  const unit = slopeUnit(record.measure.unit, record.specification.unit);
  return (
    <Section heading={text.subjectsHeading} sentence={text.subjectsSentence}>
      {typeof own?.mean_slope === 'number' ? (
        <p className="mb-3">
          {text.meanSlope(
            own.lines.length,
            formatEstimate(own.mean_slope, own.sd_slope),
            formatError(own.sd_slope),
            unit,
          )}
        </p>
      ) : null}
      {/* Long lists scroll here, so that the record below stays in reach. */}
      <div className={rows.length > 20 ? 'max-h-[600px] overflow-y-auto' : undefined}>
        <DataTable
          name={recordFile(record, 'own-lines')}
          prefix="own."
          caption={text.subjectsCaption}
          noun={text.subjectsNoun}
          columns={columns}
          rows={rows}
          rowId={(row) => row.id}
          initialSort={BY_CODE}
          picked={picked}
          onPick={(id) => onPick(id === picked ? null : id)}
        />
      </div>
    </Section>
  );
}
