/** The table twin of the spaghetti plot: the readings, or the lines, that it draws. */
import { chartsWords } from '../../words/charts.ts';
import type { TwinTable } from '../picture/types.ts';
import type { DrawAs, SpaghettiData } from './types.ts';

const { columns, lineColumns, lineUnit } = chartsWords.spaghetti;

export function spaghettiTable(data: SpaghettiData, as: DrawAs): TwinTable {
  const grouped = data.subjects.some((subject) => subject.group !== null);
  const group = grouped ? [{ name: columns.group, numeric: false }] : [];
  const of = (subject: SpaghettiData['subjects'][number]) =>
    grouped ? [subject.code, subject.group] : [subject.code];
  const unit = data.unit ?? undefined;
  if (as === 'own lines')
    return {
      columns: [
        { name: columns.subject, numeric: false },
        ...group,
        { name: lineColumns.n, numeric: true, decimals: 0 },
        { name: lineColumns.intercept, unit, numeric: true },
        { name: lineColumns.slope, unit: lineUnit(data.unit, data.per), numeric: true },
      ],
      rows: data.subjects.flatMap((subject) =>
        subject.own
          ? [[...of(subject), subject.own.n, subject.own.intercept, subject.own.slope]]
          : [],
      ),
    };
  return {
    columns: [
      { name: columns.subject, numeric: false },
      ...group,
      { name: columns.visit, numeric: false },
      { name: data.timeName, numeric: true },
      { name: data.measure, unit, numeric: true },
    ],
    rows: data.subjects.flatMap((subject) =>
      subject.readings.map((reading) => [
        ...of(subject),
        reading.visit,
        reading.time,
        reading.value,
      ]),
    ),
  };
}
