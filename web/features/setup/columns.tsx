import type { SetupView } from '../../../api/contracts/setup.ts';
import type { Column } from '../../components/data-table/column.ts';
import { words } from '../../words/en.ts';

const text = words.setup;
type Measure = SetupView['measures'][number];

export const siteColumns: Column<SetupView['sites'][number]>[] = [
  {
    id: 'code',
    heading: text.code,
    value: (row) => row.code,
    cell: (row) => <code>{row.code}</code>,
  },
  { id: 'name', heading: text.name, value: (row) => row.name, grow: true },
  { id: 'zone', heading: text.timeZone, value: (row) => row.timeZone },
];

export const visitColumns: Column<SetupView['visits'][number]>[] = [
  { id: 'name', heading: text.visit, value: (row) => row.name, grow: true },
  { id: 'day', heading: text.targetDay, value: (row) => row.targetDay, numeric: true },
  {
    id: 'window',
    heading: text.window,
    value: (row) =>
      text.windowOf(row.targetDay - row.windowBefore, row.targetDay + row.windowAfter),
    numeric: true,
    sortable: false,
  },
];

export const measureColumns: Column<Measure>[] = [
  { id: 'label', heading: text.label, value: (row) => row.label },
  {
    id: 'shortName',
    heading: text.shortName,
    value: (row) => row.shortName,
    cell: (row) => <code>{row.shortName}</code>,
  },
  { id: 'unit', heading: text.unit, value: (row) => row.unit },
  { id: 'nature', heading: text.nature, value: (row) => text.natures[row.nature] },
  { id: 'per', heading: text.per, value: (row) => text.pers[row.per] },
  {
    id: 'plausible',
    heading: text.plausible,
    value: (row) => text.range(row.plausibleLow, row.plausibleHigh, row.decimals),
    sortable: false,
  },
  {
    id: 'possible',
    heading: text.impossible,
    value: (row) => text.range(row.impossibleLow, row.impossibleHigh, row.decimals),
    sortable: false,
  },
  {
    id: 'alert',
    heading: text.alert,
    value: (row) => text.alertRange(row.alertLow, row.alertHigh, row.decimals),
    sortable: false,
  },
  {
    id: 'concern',
    heading: text.concern,
    value: (row) => (row.concern ? text.concerns[row.concern] : null),
    hidden: true,
  },
  {
    id: 'decimals',
    heading: text.decimals,
    value: (row) => row.decimals,
    numeric: true,
    hidden: true,
  },
  {
    id: 'choices',
    heading: text.choices,
    value: (row) => row.choices?.map(({ code, label }) => `${code} ${label}`).join(', ') ?? null,
    hidden: true,
  },
];
