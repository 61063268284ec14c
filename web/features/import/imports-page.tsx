import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import {
  type ImportView,
  importListQuerySchema,
  importListSchema,
  importStates,
} from '../../../api/contracts/imports.ts';
import { allRows, listQuery } from '../../app/list.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Moment } from '../../components/moment.tsx';
import { Page, Section } from '../../components/page.tsx';
import { Answer, Empty } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { importChoicesQueryOptions, importsPath, importsQueryOptions } from './queries.ts';
import { UploadForm } from './upload-form.tsx';

const text = words.imports;
const PAGE_SIZE = importListQuerySchema.parse({}).pageSize;
const NEWEST_FIRST = { id: 'uploadedAt', down: true };
const FILTERS: readonly Filter<ImportView>[] = [
  {
    id: 'state',
    label: text.state,
    choices: importStates.map((value) => ({ value, label: text.states[value] })),
  },
];

function columnsOf(study: string): Column<ImportView>[] {
  return [
    {
      id: 'fileName',
      heading: text.name,
      value: (row) => row.fileName,
      cell: (row) => (
        <Link to={paths.import(study, row.id)} className="break-all">
          {row.fileName}
        </Link>
      ),
      sortable: true,
    },
    { id: 'measure', heading: text.measure, value: (row) => row.measure.label, sortable: true },
    { id: 'state', heading: text.state, value: (row) => text.states[row.state], sortable: true },
    {
      id: 'uploadedAt',
      heading: text.uploaded,
      value: (row) => row.uploadedAt,
      cell: (row) => <Moment at={row.uploadedAt} />,
      sortable: true,
    },
    { id: 'rows', heading: text.rowsColumn, value: (row) => row.fileRows, numeric: true },
    {
      id: 'fresh',
      heading: text.fresh,
      value: (row) => writtenOf(row),
      numeric: true,
    },
    {
      id: 'known',
      heading: text.knownColumn,
      value: (row) => row.counts?.known ?? null,
      numeric: true,
    },
    {
      id: 'refused',
      heading: text.refusedColumn,
      value: (row) => row.counts?.refused ?? null,
      numeric: true,
    },
  ];
}

/** What really was written: implausible values that were left out are not. */
function writtenOf(row: ImportView): number | null {
  if (row.state === 'nothing new') return 0;
  if (row.state !== 'applied' || !row.counts) return null;
  return row.counts.fresh - (row.keepImplausible ? 0 : row.counts.implausible);
}

export function ImportsPage() {
  const { study } = useStudy();
  const control = useTableState({ filters: ['state'], initialSort: NEWEST_FIRST });
  const query = listQuery(control, PAGE_SIZE);
  const choices = useQuery(importChoicesQueryOptions(study.id));
  const imports = useQuery(importsQueryOptions(study.id, query));
  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <Answer query={choices}>
        {(offered) =>
          offered.measures.length === 0 ? (
            <Empty what={text.noMeasures} />
          ) : (
            <UploadForm study={study.id} choices={offered} />
          )
        }
      </Answer>
      <Section heading={text.listHeading} sentence={text.listSentence}>
        <Answer query={imports}>
          {({ rows, total }) => (
            <DataTable
              name="imports"
              caption={text.caption}
              noun={text.noun}
              columns={columnsOf(study.id)}
              rows={rows}
              rowId={(row) => row.id}
              filters={FILTERS}
              initialSort={NEWEST_FIRST}
              server={{
                total,
                pageSize: PAGE_SIZE,
                allRows: () => allRows(importsPath(study.id), importListSchema, query),
              }}
              empty={<Empty what={text.empty} />}
            />
          )}
        </Answer>
      </Section>
    </Page>
  );
}
