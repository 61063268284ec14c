import { useQuery } from '@tanstack/react-query';
import type { MySessions as MySessionsAnswer } from '../../../api/contracts/auth.ts';
import { sentenceOf } from '../../app/problem.ts';
import { Button } from '../../components/button.tsx';
import type { Column } from '../../components/data-table/column.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { Moment } from '../../components/moment.tsx';
import { notify } from '../../components/notices.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { browserName } from './browser-name.ts';
import { mySessionsQueryOptions, useEndSession } from './queries.ts';

const text = words.account;
type Row = MySessionsAnswer['rows'][number];

function nameOf(row: Row): string {
  return row.agent ? browserName(row.agent) : text.unknownAgent;
}

export function MySessions() {
  const sessions = useQuery(mySessionsQueryOptions);
  const end = useEndSession();

  const columns: Column<Row>[] = [
    {
      id: 'agent',
      heading: text.session,
      value: nameOf,
      cell: (row) => (
        <span>
          {nameOf(row)}
          {row.current ? <strong className="font-semibold">, {text.thisSession}</strong> : null}
        </span>
      ),
      grow: true,
    },
    {
      id: 'since',
      heading: text.signedInAt,
      value: (row) => row.createdAt,
      cell: (row) => <Moment at={row.createdAt} />,
    },
    {
      id: 'seen',
      heading: text.lastSeen,
      value: (row) => row.lastSeenAt,
      cell: (row) => <Moment at={row.lastSeenAt} />,
    },
    {
      id: 'act',
      heading: text.act,
      value: () => null,
      sortable: false,
      notExported: true,
      place: 'act',
      cell: (row) =>
        row.current ? null : (
          <Button
            weight="quiet"
            aria-label={text.endSessionOf(nameOf(row))}
            isDisabled={end.isPending}
            onPress={() =>
              end.mutate(row.id, {
                onSuccess: () => notify(text.sessionEnded),
                onError: (error) => notify(sentenceOf(error), { urgent: true }),
              })
            }
          >
            {text.endSession}
          </Button>
        ),
    },
  ];

  return (
    <Answer query={sessions}>
      {({ rows }) => (
        <DataTable
          name="sessions"
          caption={text.sessionsHeading}
          noun={text.sessionsNoun}
          columns={columns}
          rows={rows}
          rowId={(row) => row.id}
          initialSort={NEWEST_FIRST}
          plain
        />
      )}
    </Answer>
  );
}

const NEWEST_FIRST = { id: 'seen', down: true };
