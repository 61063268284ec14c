import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type AccountActRequest,
  accountListSchema,
  type CreateAccountRequest,
  issuedAccountSchema,
} from '../../../api/contracts/accounts.ts';
import { api, type Query } from '../../app/api.ts';
import { allRows } from '../../app/list.ts';

const PATH = '/api/accounts';

export function accountsQueryOptions(query: Query) {
  return queryOptions({
    queryKey: ['accounts', query],
    queryFn: ({ signal }) => api(PATH, { answer: accountListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function allAccounts(query: Query) {
  return allRows(PATH, accountListSchema, query);
}

function useAccountAct<Input, Output>(act: (input: Input) => Promise<Output>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSettled: () => client.invalidateQueries({ queryKey: ['accounts'] }),
  });
}

export function useCreateAccount() {
  return useAccountAct((body: CreateAccountRequest) =>
    api(PATH, { method: 'POST', body, answer: issuedAccountSchema }),
  );
}

type Act = AccountActRequest & { id: string };

export function useSetAccountOpen() {
  return useAccountAct(({ id, open, ...body }: Act & { open: boolean }) =>
    api(`${PATH}/${id}/${open ? 'enable' : 'disable'}`, { method: 'POST', body }),
  );
}

export function useResetAccount() {
  return useAccountAct(({ id, ...body }: Act) =>
    api(`${PATH}/${id}/reset`, { method: 'POST', body, answer: issuedAccountSchema }),
  );
}
