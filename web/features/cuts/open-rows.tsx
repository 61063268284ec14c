/** What was late or still open when a cut was frozen. */
import type { CutDetail } from '../../../api/contracts/cuts.ts';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { formatDay } from '../../components/dates.ts';
import { Moment } from '../../components/moment.tsx';
import { formatCount } from '../../components/numbers.ts';
import { Section } from '../../components/page.tsx';
import { words } from '../../words/en.ts';

const text = words.cuts;
type Late = CutDetail['lateRows'][number];
type Pending = CutDetail['pendingRows'][number];

const code = (row: { subjectCode: string }) => <span className="figure">{row.subjectCode}</span>;

export function LateRows({ cut }: { cut: CutDetail }) {
  if (cut.lateRows.length === 0) return <Section heading={text.lateHeading(0)}>{null}</Section>;
  const labels = new Map(cut.measures.map(({ shortName, label }) => [shortName, label]));
  const { lateColumns } = text;
  const columns: Column<Late>[] = [
    { id: 'subject', heading: lateColumns.subject, value: (row) => row.subjectCode, cell: code },
    { id: 'visit', heading: lateColumns.visit, value: (row) => row.visit },
    {
      id: 'measure',
      heading: lateColumns.measure,
      value: (row) => labels.get(row.measure) ?? row.measure,
    },
    {
      id: 'visitDate',
      heading: lateColumns.visitDate,
      value: (row) => row.visitDate,
      cell: (row) => formatDay(row.visitDate),
    },
    {
      id: 'enteredAt',
      heading: lateColumns.enteredAt,
      value: (row) => row.enteredAt,
      cell: (row) => <Moment at={row.enteredAt} />,
    },
    {
      id: 'days',
      heading: lateColumns.days,
      value: (row) => row.days,
      cell: (row) => formatCount(row.days),
      numeric: true,
    },
  ];
  return (
    <Section heading={text.lateHeading(cut.lateRows.length)}>
      <DataTable
        name={`cut-${cut.number}-late`}
        prefix="late."
        caption={text.lateCaption}
        noun={text.lateNoun}
        columns={columns}
        rows={cut.lateRows}
        rowId={(row) => `${row.subjectCode} ${row.visit} ${row.measure} ${row.enteredAt}`}
      />
    </Section>
  );
}

export function PendingRows({ cut }: { cut: CutDetail }) {
  if (cut.pendingRows.length === 0)
    return <Section heading={text.pendingHeading(0)}>{null}</Section>;
  const { pendingColumns } = text;
  const columns: Column<Pending>[] = [
    { id: 'subject', heading: pendingColumns.subject, value: (row) => row.subjectCode, cell: code },
    { id: 'visit', heading: pendingColumns.visit, value: (row) => row.visit },
    {
      id: 'windowClosed',
      heading: pendingColumns.windowClosed,
      value: (row) => row.windowClosed,
      cell: (row) => formatDay(row.windowClosed),
    },
  ];
  return (
    <Section heading={text.pendingHeading(cut.pendingRows.length)} sentence={text.pendingSentence}>
      <DataTable
        name={`cut-${cut.number}-pending`}
        prefix="pending."
        caption={text.pendingCaption}
        noun={text.pendingNoun}
        columns={columns}
        rows={cut.pendingRows}
        rowId={(row) => `${row.subjectCode} ${row.visit} ${row.windowClosed}`}
      />
    </Section>
  );
}
