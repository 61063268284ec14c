import { type AccountView, accountStates } from '../../../api/contracts/accounts.ts';
import { Button } from '../../components/button.tsx';
import type { Column, Filter } from '../../components/data-table/column.ts';
import { Moment } from '../../components/moment.tsx';
import { words } from '../../words/en.ts';
import type { AccountAct } from './account-act-dialog.tsx';

const text = words.accounts;
const KINDS = ['member', 'administrator'] as const;

export const FILTERS: readonly Filter<AccountView>[] = [
  { id: 'text', label: text.search },
  {
    id: 'kind',
    label: text.kind,
    choices: KINDS.map((value) => ({ value, label: text.kinds[value] })),
  },
  {
    id: 'state',
    label: text.state,
    choices: accountStates.map((value) => ({ value, label: text.states[value] })),
  },
];

function stateOf(row: AccountView): string {
  return row.mustChangePassword && row.state === 'active'
    ? `${text.states[row.state]}, ${text.waiting}`
    : text.states[row.state];
}

type ColumnOptions = {
  /** The administrator's own account, to which none of the acts applies. */
  own: string;
  act: (kind: AccountAct, account: AccountView) => void;
};

export function accountColumns({ own, act }: ColumnOptions): Column<AccountView>[] {
  return [
    { id: 'name', heading: text.name, value: (row) => row.name, sortable: true },
    { id: 'email', heading: text.email, value: (row) => row.email, sortable: true },
    {
      id: 'kind',
      heading: text.kind,
      value: (row) => text.kinds[row.administrator ? 'administrator' : 'member'],
    },
    { id: 'state', heading: text.state, value: stateOf, sortable: true },
    {
      id: 'lastSeenAt',
      heading: text.lastSeen,
      value: (row) => row.lastSeenAt,
      cell: (row) => (row.lastSeenAt ? <Moment at={row.lastSeenAt} /> : text.never),
      sortable: true,
    },
    {
      id: 'createdAt',
      heading: text.created,
      value: (row) => row.createdAt,
      cell: (row) => <Moment at={row.createdAt} />,
      sortable: true,
      hidden: true,
    },
    {
      id: 'act',
      heading: text.act,
      value: () => null,
      notExported: true,
      place: 'act',
      cell: (row) =>
        row.id === own ? null : (
          <span className="flex flex-wrap gap-x-3">
            <Button
              weight="quiet"
              aria-label={text.resetOf(row.name)}
              onPress={() => act('reset', row)}
            >
              {text.reset}
            </Button>
            {row.state === 'active' ? (
              <Button
                weight="quiet"
                aria-label={text.disableOf(row.name)}
                onPress={() => act('disable', row)}
              >
                {text.disable}
              </Button>
            ) : (
              <Button
                weight="quiet"
                aria-label={text.enableOf(row.name)}
                onPress={() => act('enable', row)}
              >
                {text.enable}
              </Button>
            )}
          </span>
        ),
    },
  ];
}
