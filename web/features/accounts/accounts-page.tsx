import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import {
  type AccountView,
  accountListQuerySchema,
  type IssuedAccount,
} from '../../../api/contracts/accounts.ts';
import { listQuery } from '../../app/list.ts';
import { useMe } from '../../app/session.ts';
import { DataTable } from '../../components/data-table/data-table.tsx';
import { useTableState } from '../../components/data-table/table-state.ts';
import { Page, Section } from '../../components/page.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { type AccountAct, AccountActDialog } from './account-act-dialog.tsx';
import { accountColumns, FILTERS } from './columns.tsx';
import { CreateAccountForm } from './create-account-form.tsx';
import { IssuedPassword } from './issued-password.tsx';
import { accountsQueryOptions, allAccounts } from './queries.ts';

const text = words.accounts;
const PAGE_SIZE = accountListQuerySchema.parse({}).pageSize;
const FILTER_IDS = FILTERS.map(({ id }) => id);
const BY_NAME = { id: 'name', down: false };

export function AccountsPage() {
  const me = useMe();
  const control = useTableState({ filters: FILTER_IDS, initialSort: BY_NAME });
  const query = listQuery(control, PAGE_SIZE);
  const accounts = useQuery(accountsQueryOptions(query));
  const [act, setAct] = useState<{ kind: AccountAct; account: AccountView } | null>(null);
  const [issued, setIssued] = useState<IssuedAccount | null>(null);

  return (
    <Page heading={text.heading} sentence={text.sentence}>
      <Answer query={accounts}>
        {({ rows, total }) => (
          <DataTable
            name="accounts"
            caption={text.caption}
            noun={text.noun}
            columns={accountColumns({
              own: me.account.id,
              act: (kind, account) => setAct({ kind, account }),
            })}
            rows={rows}
            rowId={(row) => row.id}
            filters={FILTERS}
            initialSort={BY_NAME}
            server={{ total, pageSize: PAGE_SIZE, allRows: () => allAccounts(query) }}
          />
        )}
      </Answer>
      <Section heading={text.createHeading} sentence={text.createSentence}>
        <CreateAccountForm onIssued={setIssued} />
      </Section>
      {act ? (
        <AccountActDialog
          kind={act.kind}
          account={act.account}
          onClose={() => setAct(null)}
          onIssued={setIssued}
        />
      ) : null}
      {issued ? <IssuedPassword issued={issued} onClose={() => setIssued(null)} /> : null}
    </Page>
  );
}
