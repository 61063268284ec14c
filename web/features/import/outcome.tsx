import { useQuery } from '@tanstack/react-query';
import type { ImportCounts, ImportView } from '../../../api/contracts/imports.ts';
import { apiFile } from '../../app/api.ts';
import { listQuery } from '../../app/list.ts';
import { sentenceOf } from '../../app/problem.ts';
import { saveFile } from '../../components/csv.ts';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { notify } from '../../components/notices.tsx';
import { formatLoose } from '../../components/numbers.ts';
import { Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { rowReasons } from '../../words/imports.ts';
import { fillSentence, type ProblemParams } from '../../words/problems.ts';
import { implausibleQueryOptions, refusalsFile, refusalsQueryOptions } from './queries.ts';

const text = words.imports;
const PAGE_SIZE = 50;

/** The figures of a dry run, each in a sentence; a figure of nothing is not said. */
export function OutcomeSentences({ counts }: { counts: ImportCounts }) {
  const { outcome } = text;
  const sentences = [
    outcome.fresh(counts.fresh),
    counts.newSubjects > 0 ? outcome.newSubjects(counts.newSubjects) : null,
    counts.newVisits > 0 ? outcome.newVisits(counts.newVisits, counts.unscheduled) : null,
    counts.implausible > 0 ? outcome.implausible(counts.implausible) : null,
    counts.known > 0 ? outcome.known(counts.known) : null,
    counts.refused > 0 ? outcome.refused(counts.refused) : null,
  ].filter((sentence) => sentence !== null);
  return (
    <ul className="max-w-text">
      {sentences.map((sentence) => (
        <li key={sentence}>{sentence}</li>
      ))}
    </ul>
  );
}

type Refusal = {
  line: number;
  subject: string;
  value: string;
  reason: { code: string; params: ProblemParams };
};

function reasonOf({ reason }: Refusal): string {
  const sentence = rowReasons[reason.code];
  if (!sentence) throw new Error(`no words for the refusal ${reason.code}`);
  return fillSentence(sentence, reason.params);
}

const REFUSED: Column<Refusal>[] = [
  { id: 'line', heading: text.line, value: (row) => row.line, numeric: true },
  {
    id: 'subject',
    heading: text.subject,
    value: (row) => row.subject,
    cell: (row) => <span className="figure">{row.subject || words.common.none}</span>,
  },
  {
    id: 'value',
    heading: text.valueColumn,
    value: (row) => row.value,
    cell: (row) => (
      <span className="figure inline-block min-w-[12ch] max-w-[32ch] break-words">
        {row.value || words.common.none}
      </span>
    ),
  },
  { id: 'reason', heading: text.reason, value: reasonOf, grow: true, place: 'wide' },
];

export function RefusedRows({ study, view }: { study: string; view: ImportView }) {
  const control = useTableState({ prefix: 'r-' });
  const query = listQuery(control, PAGE_SIZE);
  const refusals = useQuery(refusalsQueryOptions(study, view, query));
  function exportCsv() {
    apiFile(refusalsFile(study, view.id))
      .then((file) => saveFile('refused-rows.csv', file))
      .catch((error) => notify(sentenceOf(error), { urgent: true }));
  }
  return (
    <Section heading={text.refusedHeading} sentence={text.refusedSentence}>
      <Answer query={refusals}>
        {({ rows, total }) => (
          <DataTable
            name="refused-rows"
            caption={text.refusedCaption}
            noun={text.refusedNoun}
            columns={REFUSED}
            rows={rows}
            rowId={(row) => String(row.line)}
            prefix="r-"
            server={{ total, pageSize: PAGE_SIZE, exportCsv }}
          />
        )}
      </Answer>
    </Section>
  );
}

type Implausible = {
  line: number;
  subject: string;
  visit: string;
  value: number;
  plausibleLow: number | null;
  plausibleHigh: number | null;
};

export function ImplausibleRows({ study, view }: { study: string; view: ImportView }) {
  const control = useTableState({ prefix: 'i-' });
  const query = listQuery(control, PAGE_SIZE);
  const implausible = useQuery(implausibleQueryOptions(study, view, query));
  const unit = view.measure.unit ?? undefined;
  const columns: Column<Implausible>[] = [
    { id: 'line', heading: text.line, value: (row) => row.line, numeric: true },
    {
      id: 'subject',
      heading: text.subject,
      value: (row) => row.subject,
      cell: (row) => <span className="figure">{row.subject}</span>,
    },
    { id: 'visit', heading: text.visit, value: (row) => row.visit },
    {
      id: 'value',
      heading: view.measure.label,
      unit,
      value: (row) => row.value,
      cell: (row) => formatLoose(row.value),
      numeric: true,
      place: 'wide',
    },
  ];
  return (
    <Section heading={text.implausibleHeading}>
      <Answer query={implausible}>
        {({ rows, total }) => (
          <>
            {rows[0] ? (
              <p className="mb-2 text-faded">
                {text.implausibleSentence(
                  formatLoose(rows[0].plausibleLow),
                  formatLoose(rows[0].plausibleHigh),
                )}
              </p>
            ) : null}
            <DataTable
              name="implausible-values"
              caption={text.implausibleCaption}
              noun={text.implausibleNoun}
              columns={columns}
              rows={rows}
              rowId={(row) => String(row.line)}
              prefix="i-"
              server={{ total, pageSize: PAGE_SIZE }}
            />
          </>
        )}
      </Answer>
    </Section>
  );
}
