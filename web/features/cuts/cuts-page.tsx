import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { type CutSummary, cutListQuerySchema } from '../../../api/contracts/cuts.ts';
import { cutsQueryOptions } from '../../app/cut-queries.ts';
import { listQuery } from '../../app/list.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { ButtonLink } from '../../components/button.tsx';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Day, Moment } from '../../components/moment.tsx';
import { formatCount } from '../../components/numbers.ts';
import { Page } from '../../components/page.tsx';
import { Answer, Empty } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { allCuts } from './queries.ts';

const text = words.cuts;
const PAGE_SIZE = cutListQuerySchema.parse({}).pageSize;
const FILTERS: readonly Filter<CutSummary>[] = [{ id: 'text', label: text.search }];
const NEWEST = { id: 'number', down: true };

function columnsOf(study: string): Column<CutSummary>[] {
  const count = (
    id: 'rows' | 'subjects' | 'late' | 'pending',
    sortable: boolean,
  ): Column<CutSummary> => ({
    id,
    heading: text.columns[id],
    value: (row) => row[id],
    cell: (row) => formatCount(row[id]),
    numeric: true,
    sortable,
  });
  return [
    {
      id: 'number',
      heading: text.columns.number,
      value: (row) => row.number,
      cell: (row) => <span className="figure">{row.number}</span>,
      sortable: true,
    },
    {
      id: 'name',
      heading: text.columns.name,
      value: (row) => row.name,
      cell: (row) => <Link to={paths.cut(study, row.id)}>{row.name}</Link>,
      sortable: true,
      fixed: true,
      grow: true,
      place: 'first',
    },
    {
      id: 'visitCutoff',
      heading: text.columns.visitCutoff,
      value: (row) => row.visitCutoff,
      cell: (row) => <Day on={row.visitCutoff} />,
      sortable: true,
    },
    count('subjects', false),
    count('rows', true),
    count('late', true),
    count('pending', true),
    {
      id: 'measures',
      heading: text.columns.measures,
      value: (row) => words.common.list(row.measures.map(({ label }) => label)),
      hidden: true,
      place: 'wide',
    },
    {
      id: 'frozenAt',
      heading: text.columns.frozenAt,
      value: (row) => row.frozenAt,
      cell: (row) => <Moment at={row.frozenAt} />,
      sortable: true,
    },
    {
      id: 'frozenBy',
      heading: text.columns.frozenBy,
      value: (row) => row.frozenBy,
      cell: (row) => <span className="whitespace-nowrap">{row.frozenBy}</span>,
    },
    {
      id: 'sha256',
      heading: text.columns.sha256,
      value: (row) => row.sha256.slice(0, 12),
      cell: (row) => <code className="text-13">{row.sha256.slice(0, 12)}</code>,
      hidden: true,
    },
  ];
}

export function CutsPage() {
  const { study, roles } = useStudy();
  const mayFreeze = roles.includes('analyst');
  const control = useTableState({ filters: FILTERS.map(({ id }) => id), initialSort: NEWEST });
  const query = listQuery(control, PAGE_SIZE);
  const cuts = useQuery(cutsQueryOptions(study.id, query));
  const freeze = mayFreeze ? (
    <ButtonLink weight="filled" to={`${paths.cuts(study.id)}/new`}>
      {text.freezeLink}
    </ButtonLink>
  ) : undefined;
  const filtered = Object.keys(control.filters).length > 0;
  const total = cuts.data?.total;
  const none = total === 0 && !filtered;
  return (
    <Page
      heading={total === undefined || filtered ? words.places.cuts : text.heading(total)}
      sentence={text.sentence}
      aside={none ? undefined : freeze}
    >
      <Answer query={cuts}>
        {({ rows, total: all }) => (
          <DataTable
            name="cuts"
            caption={text.caption}
            noun={text.noun}
            columns={columnsOf(study.id)}
            rows={rows}
            rowId={(row) => row.id}
            filters={FILTERS}
            initialSort={NEWEST}
            server={{ total: all, pageSize: PAGE_SIZE, allRows: () => allCuts(study.id, query) }}
            empty={<Empty what={mayFreeze ? text.empty : text.emptyOwner} act={freeze} />}
          />
        )}
      </Answer>
    </Page>
  );
}
