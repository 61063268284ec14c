import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type AddMemberRequest,
  type ChangeMemberRequest,
  memberListSchema,
  type RemoveMemberRequest,
} from '../../../api/contracts/members.ts';
import { api, type Query } from '../../app/api.ts';
import { allRows } from '../../app/list.ts';

const pathOf = (study: string) => `/api/studies/${study}/members`;

export function membersQueryOptions(study: string, query: Query) {
  return queryOptions({
    queryKey: ['members', study, query],
    queryFn: ({ signal }) => api(pathOf(study), { answer: memberListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function allMembers(study: string, query: Query) {
  return allRows(pathOf(study), memberListSchema, query);
}

/** What an owner may do to a member; each act reads the list and the session again. */
function useMemberAct<Input>(act: (input: Input) => Promise<void>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSettled: async () => {
      await client.invalidateQueries({ queryKey: ['members'] });
      // An owner may have changed their own duties.
      await client.invalidateQueries({ queryKey: ['me'] });
    },
  });
}

export function useAddMember(study: string) {
  return useMemberAct((body: AddMemberRequest) => api(pathOf(study), { method: 'POST', body }));
}

export function useChangeMember(study: string) {
  return useMemberAct(({ id, ...body }: ChangeMemberRequest & { id: string }) =>
    api(`${pathOf(study)}/${id}`, { method: 'PATCH', body }),
  );
}

export function useRemoveMember(study: string) {
  return useMemberAct(({ id, ...body }: RemoveMemberRequest & { id: string }) =>
    api(`${pathOf(study)}/${id}/remove`, { method: 'POST', body }),
  );
}
