import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import {
  fits,
  purposes,
  type RecordSummary,
  recordListQuerySchema,
} from '../../../api/contracts/analysis.ts';
import type { CutSummary } from '../../../api/contracts/cuts.ts';
import { cutChoicesQueryOptions } from '../../app/cut-queries.ts';
import { listQuery } from '../../app/list.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { ButtonLink } from '../../components/button.tsx';
import type { Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Page } from '../../components/page.tsx';
import { Answer, Empty } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { columnsOf } from './columns.tsx';
import { allRecords, recordsQueryOptions } from './queries.ts';

const text = words.records;
const PAGE_SIZE = recordListQuerySchema.parse({}).pageSize;
const FILTER_IDS = ['measure', 'cut', 'fit', 'purpose', 'signed'];
const NEWEST = { id: 'at', down: true };

function filtersOf(cuts: readonly CutSummary[]): Filter<RecordSummary>[] {
  const measures = new Map(
    cuts.flatMap((cut) => cut.measures.map(({ shortName, label }) => [shortName, label] as const)),
  );
  return [
    {
      id: 'measure',
      label: text.filters.measure,
      choices: [...measures].map(([value, label]) => ({ value, label })),
    },
    {
      id: 'cut',
      label: text.filters.cut,
      choices: cuts.map(({ id, number, name }) => ({
        value: id,
        label: words.analysis.cutName(number, name),
      })),
    },
    {
      id: 'fit',
      label: text.filters.fit,
      choices: fits.map((value) => ({ value, label: text.fitNames[value] })),
    },
    {
      id: 'purpose',
      label: text.filters.purpose,
      choices: purposes.map((value) => ({ value, label: words.analysis.purposes[value] })),
    },
    {
      id: 'signed',
      label: text.filters.signed,
      choices: [
        { value: 'yes', label: words.common.yes },
        { value: 'no', label: words.common.no },
      ],
    },
  ];
}

export function RecordsPage() {
  const { study, roles } = useStudy();
  const control = useTableState({ filters: FILTER_IDS, initialSort: NEWEST });
  const query = listQuery(control, PAGE_SIZE);
  const records = useQuery(recordsQueryOptions(study.id, query));
  const cuts = useQuery(cutChoicesQueryOptions(study.id));
  const filters = useMemo(() => filtersOf(cuts.data?.rows ?? []), [cuts.data]);
  const isAnalyst = roles.includes('analyst');
  const filtered = Object.keys(control.filters).length > 0;
  const total = records.data?.total;
  return (
    <Page
      heading={total === undefined || filtered ? words.places.records : text.heading(total)}
      sentence={text.sentence}
    >
      <Answer query={records}>
        {({ rows, total: all }) => (
          <DataTable
            name="records"
            caption={text.caption}
            noun={text.noun}
            columns={columnsOf(study.id)}
            rows={rows}
            rowId={(row) => row.id}
            filters={filters}
            initialSort={NEWEST}
            server={{ total: all, pageSize: PAGE_SIZE, allRows: () => allRecords(study.id, query) }}
            empty={
              <Empty
                what={isAnalyst ? text.empty : text.emptyOwner}
                act={
                  isAnalyst ? (
                    <ButtonLink weight="filled" to={paths.check(study.id)}>
                      {text.toCheck}
                    </ButtonLink>
                  ) : undefined
                }
              />
            }
          />
        )}
      </Answer>
    </Page>
  );
}
