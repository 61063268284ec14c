import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  recordDetailSchema,
  recordListSchema,
  type signRecordRequestSchema,
} from '../../../api/contracts/analysis.ts';
import { api, type Query } from '../../app/api.ts';
import { allRows } from '../../app/list.ts';

const listPath = (study: string) => `/api/studies/${study}/records`;
export const recordPath = (study: string, record: string) => `${listPath(study)}/${record}`;

export function recordsQueryOptions(study: string, query: Query) {
  return queryOptions({
    queryKey: ['records', study, query],
    queryFn: ({ signal }) => api(listPath(study), { answer: recordListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function allRecords(study: string, query: Query) {
  return allRows(listPath(study), recordListSchema, query);
}

export function recordQueryOptions(study: string, record: string) {
  return queryOptions({
    queryKey: ['record', study, record],
    queryFn: ({ signal }) => api(recordPath(study, record), { answer: recordDetailSchema, signal }),
  });
}

export function useSignRecord(study: string, record: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: z.infer<typeof signRecordRequestSchema>) =>
      api(`${recordPath(study, record)}/signatures`, {
        method: 'POST',
        body,
        answer: recordDetailSchema,
      }),
    onSuccess: async (signed) => {
      client.setQueryData(recordQueryOptions(study, record).queryKey, signed);
      await client.invalidateQueries({ queryKey: ['records', study] });
    },
  });
}
