import type { SubjectDetail, VisitView } from '../../../api/contracts/subjects.ts';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { formatDay } from '../../components/dates.ts';
import { Day, Moment } from '../../components/moment.tsx';
import { words } from '../../words/en.ts';
import { ReadingCell } from './reading-cell.tsx';
import { type Measure, readingText } from './reading-text.ts';

const text = words.subjects;

function stateText(visit: VisitView): string {
  if (visit.afterEnd && visit.id === null) return text.afterEnd;
  if (visit.missedReason) return text.missedBecause(visit.missedReason, visit.missedText);
  if (visit.unscheduledReason) return text.unscheduledBecause(visit.unscheduledReason);
  return visit.outOfWindow ? `${visit.state}, ${text.outOfWindow}` : visit.state;
}

function windowText(visit: VisitView): string {
  if (!visit.windowFromDate || !visit.windowToDate) return words.common.none;
  if (visit.windowFromDate === visit.windowToDate) return formatDay(visit.windowFromDate);
  return `${formatDay(visit.windowFromDate)} – ${formatDay(visit.windowToDate)}`;
}

const partialDate = (visit: VisitView) => {
  if (!visit.date || visit.datePrecision === 'day') return visit.date;
  return visit.date.slice(0, visit.datePrecision === 'month' ? 7 : 4);
};

function readingColumn(measure: Measure): Column<VisitView> {
  const of = (visit: VisitView) =>
    visit.readings.filter((reading) => reading.measure === measure.shortName);
  return {
    id: measure.shortName,
    heading: measure.label,
    unit: measure.unit ?? undefined,
    numeric: measure.nature !== 'choice',
    value: (visit) =>
      of(visit)
        .map((reading) => readingText(reading, measure))
        .join('; ') || null,
    cell: (visit) => {
      const readings = of(visit);
      if (readings.length === 0) return words.common.none;
      return readings.map((reading) => (
        <ReadingCell key={reading.id} reading={reading} measure={measure} />
      ));
    },
  };
}

/** All visits of one subject, a row each, a column for each measure. */
export function VisitsTable({ subject }: { subject: SubjectDetail }) {
  const columns: Column<VisitView>[] = [
    { id: 'visit', heading: text.visit, value: (visit) => visit.name },
    {
      id: 'state',
      heading: text.state,
      value: stateText,
      cell: (visit) => (
        <span className={visit.state === 'overdue' ? 'text-stop' : undefined}>
          {stateText(visit)}
        </span>
      ),
    },
    {
      id: 'date',
      heading: text.date,
      value: partialDate,
      cell: (visit) => <Day on={partialDate(visit)} />,
    },
    { id: 'window', heading: text.window, value: windowText, hidden: true },
    ...subject.measures.filter(({ per }) => per === 'visit').map(readingColumn),
    {
      id: 'contact',
      heading: text.contact,
      value: (visit) => visit.contactMode,
      hidden: true,
    },
    {
      id: 'origin',
      heading: text.origin,
      value: (visit) => visit.loggedAt,
      cell: (visit) =>
        visit.loggedAt ? (
          <span className="text-13">
            <Moment at={visit.loggedAt} />
            <span className="block text-faded">
              {visit.fromImport
                ? text.fromImport(visit.fromImport.fileName)
                : text.by(visit.loggedBy ?? '')}
            </span>
          </span>
        ) : (
          words.common.none
        ),
      hidden: true,
    },
  ];
  return (
    <DataTable
      name={`visits-${subject.code}`}
      caption={text.visitsCaption}
      noun={text.visitNoun}
      columns={columns}
      rows={subject.visits}
      rowId={(visit) => visit.id ?? visit.plannedVisitId ?? visit.name}
    />
  );
}
