/** Columns of the list of records: a stamp never leaves a number that came from an ordinary fit. */
import { Link } from 'react-router-dom';
import type { RecordSummary } from '../../../api/contracts/analysis.ts';
import { paths } from '../../app/paths.ts';
import type { Column } from '../../components/data-table/column.ts';
import { Moment } from '../../components/moment.tsx';
import { formatEstimate, formatInterval } from '../../components/numbers.ts';
import { slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';

const { columns: names, fitNames } = words.records;

/** The list holds no error; a quarter of the interval's width is close enough to choose digits by. */
function errorOf({ headline: { lower, upper } }: RecordSummary): number | null {
  return lower === null || upper === null ? null : (upper - lower) / 4;
}

export function columnsOf(study: string): Column<RecordSummary>[] {
  return [
    {
      id: 'at',
      heading: names.at,
      value: (row) => row.at,
      cell: (row) => (
        <Link to={paths.record(study, row.id)}>
          <Moment at={row.at} />
        </Link>
      ),
      sortable: true,
    },
    {
      id: 'measure',
      heading: names.measure,
      value: (row) => row.measure.label,
      sortable: true,
    },
    {
      id: 'cut',
      heading: names.cut,
      value: (row) => `${row.cut.number}, ${row.cut.name}`,
      sortable: true,
    },
    {
      id: 'specification',
      heading: names.specification,
      value: (row) => row.specification.number,
      numeric: true,
      sortable: true,
    },
    {
      id: 'fit',
      heading: names.fit,
      value: (row) => fitNames[row.fit],
      cell: (row) => <span className="whitespace-nowrap">{fitNames[row.fit]}</span>,
      sortable: true,
    },
    {
      id: 'purpose',
      heading: names.purpose,
      value: (row) => words.analysis.purposes[row.purpose],
      sortable: true,
    },
    {
      id: 'trend',
      heading: names.trend,
      value: (row) => row.headline.estimate,
      cell: (row) => (
        <span className="inline-flex flex-col items-end py-1">
          {formatEstimate(row.headline.estimate, errorOf(row))}
          <span className="font-sans text-13 text-faded">
            {slopeUnit(row.measure.unit, row.specification.unit)}
          </span>
        </span>
      ),
      numeric: true,
    },
    {
      id: 'interval',
      heading: names.interval,
      value: ({ headline: { lower, upper } }) =>
        lower === null || upper === null ? null : `${lower} to ${upper}`,
      cell: (row) => formatInterval(row.headline.lower, row.headline.upper),
      numeric: true,
    },
    // Stands beside the number and can't be taken away, so that the file of this view has it too.
    {
      id: 'stamp',
      heading: names.stamp,
      exportHeading: 'stamp',
      value: (row) => row.stamp,
      cell: (row) =>
        row.stamp ? (
          <strong className="text-13 text-flare-ink">{row.stamp}</strong>
        ) : (
          words.common.none
        ),
      fixed: true,
    },
    {
      id: 'by',
      heading: names.by,
      value: (row) => row.by,
      cell: (row) => <span className="whitespace-nowrap">{row.by}</span>,
      sortable: true,
    },
    {
      id: 'signed',
      heading: names.signed,
      value: (row) => (row.signed ? words.common.yes : words.common.no),
    },
  ];
}
