import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type ChangeMeRequest,
  type ChangePasswordRequest,
  mySessionsSchema,
} from '../../../api/contracts/auth.ts';
import { api } from '../../app/api.ts';
import { meQueryOptions } from '../../app/session.ts';

export const mySessionsQueryOptions = queryOptions({
  queryKey: ['my-sessions'],
  queryFn: ({ signal }) => api('/api/me/sessions', { answer: mySessionsSchema, signal }),
});

export function useChangeMe() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeMeRequest) => api('/api/me', { method: 'PATCH', body }),
    onSettled: () => client.invalidateQueries({ queryKey: meQueryOptions.queryKey }),
  });
}

export function useEndSession() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api(`/api/me/sessions/${id}`, { method: 'DELETE' }),
    onSettled: () => client.invalidateQueries({ queryKey: mySessionsQueryOptions.queryKey }),
  });
}

export function changePassword(body: ChangePasswordRequest): Promise<void> {
  return api('/api/me/password', { method: 'POST', body });
}
