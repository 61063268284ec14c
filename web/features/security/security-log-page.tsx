import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import {
  type SecurityEntry,
  securityActions,
  securityLogQuerySchema,
  securityLogSchema,
} from '../../../api/contracts/accounts.ts';
import { address, api, apiFile, type Query } from '../../app/api.ts';
import { listQuery } from '../../app/list.ts';
import { sentenceOf } from '../../app/problem.ts';
import { saveFile } from '../../components/csv.ts';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Hash } from '../../components/hash.tsx';
import { Moment } from '../../components/moment.tsx';
import { notify } from '../../components/notices.tsx';
import { Page } from '../../components/page.tsx';
import { Answer, Empty } from '../../components/states.tsx';
import { words } from '../../words/en.ts';

const text = words.security;
const PATH = '/api/security-log';
const PAGE_SIZE = securityLogQuerySchema.parse({}).pageSize;
const NEWEST_FIRST = { id: 'number', down: true };
const FILTERS: readonly Filter<SecurityEntry>[] = [
  {
    id: 'action',
    label: text.action,
    choices: securityActions.map((value) => ({ value, label: text.actions[value] })),
  },
  { id: 'text', label: text.search },
  { id: 'from', label: text.from, day: true },
  { id: 'until', label: text.until, day: true },
];
const FILTER_IDS = FILTERS.map(({ id }) => id);

function logQueryOptions(query: Query) {
  return queryOptions({
    queryKey: ['security-log', query],
    queryFn: ({ signal }) => api(PATH, { answer: securityLogSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

function actionOf(row: SecurityEntry): string {
  const known = securityActions.find((action) => action === row.action);
  return known ? text.actions[known] : row.action;
}

const COLUMNS: Column<SecurityEntry>[] = [
  {
    id: 'number',
    heading: text.number,
    value: (row) => row.number,
    numeric: true,
    sortable: true,
  },
  { id: 'at', heading: text.at, value: (row) => row.at, cell: (row) => <Moment at={row.at} /> },
  { id: 'action', heading: text.action, value: actionOf, place: 'wide' },
  { id: 'by', heading: text.by, value: (row) => row.by ?? text.nobody },
  { id: 'about', heading: text.about, value: (row) => row.about ?? text.unknownAccount },
  {
    id: 'address',
    heading: text.address,
    value: (row) => row.address,
    cell: (row) =>
      row.address ? (
        <code className="text-13" title={text.addressNote}>
          {row.address.slice(0, 8)}
        </code>
      ) : (
        words.common.none
      ),
  },
  { id: 'reason', heading: text.reason, value: (row) => row.reason },
  {
    id: 'hash',
    heading: text.hash,
    value: (row) => row.hash,
    cell: (row) => <Hash value={row.hash} />,
    hidden: true,
  },
];

export function SecurityLogPage() {
  const control = useTableState({ filters: FILTER_IDS, initialSort: NEWEST_FIRST });
  // The log has one order, that of its numbers; only its direction is chosen.
  const query = { ...listQuery(control, PAGE_SIZE), sort: undefined };
  const log = useQuery(logQueryOptions(query));

  function exportCsv() {
    const filter = { ...query, page: undefined, pageSize: undefined };
    apiFile(address(`${PATH}.csv`, filter))
      .then((file) => saveFile('security-log.csv', file))
      .catch((error) => notify(sentenceOf(error), { urgent: true }));
  }

  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <Answer query={log}>
        {({ rows, total }) => (
          <DataTable
            name="security-log"
            caption={text.caption}
            noun={text.noun}
            columns={COLUMNS}
            rows={rows}
            rowId={(row) => String(row.number)}
            filters={FILTERS}
            initialSort={NEWEST_FIRST}
            server={{ total, pageSize: PAGE_SIZE, exportCsv }}
            empty={<Empty what={text.empty} />}
          />
        )}
      </Answer>
    </Page>
  );
}
