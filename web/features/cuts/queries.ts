import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  cutChoicesSchema,
  cutDetailSchema,
  cutListSchema,
  cutPreviewSchema,
  type FreezeCutRequest,
} from '../../../api/contracts/cuts.ts';
import { api, type Query } from '../../app/api.ts';
import { cutQueryOptions, cutsPath } from '../../app/cut-queries.ts';
import { allRows } from '../../app/list.ts';

export function allCuts(study: string, query: Query) {
  return allRows(cutsPath(study), cutListSchema, query);
}

export function freezeChoicesQueryOptions(study: string) {
  return queryOptions({
    queryKey: ['cut-choices', study],
    queryFn: ({ signal }) =>
      api(`/api/studies/${study}/cut-choices`, { answer: cutChoicesSchema, signal }),
  });
}

/** What a cut would hold now; the last answer stays while a changed question is asked. */
export function cutPreviewQueryOptions(
  study: string,
  question: { visitCutoff: string; measures: readonly string[] },
) {
  const query = { visitCutoff: question.visitCutoff, measures: question.measures.join(',') };
  return queryOptions({
    queryKey: ['cut-preview', study, query],
    queryFn: ({ signal }) =>
      api(`/api/studies/${study}/cut-preview`, { answer: cutPreviewSchema, query, signal }),
    enabled: /^\d{4}-\d{2}-\d{2}$/.test(query.visitCutoff) && question.measures.length > 0,
    placeholderData: keepPreviousData,
    staleTime: 0,
  });
}

export function useFreezeCut(study: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, key }: { body: FreezeCutRequest; key: string }) =>
      api(cutsPath(study), {
        method: 'POST',
        body,
        answer: cutDetailSchema,
        idempotencyKey: key,
      }),
    onSuccess: async (cut) => {
      client.setQueryData(cutQueryOptions(study, cut.id).queryKey, cut);
      await client.invalidateQueries({ queryKey: ['cuts', study] });
    },
  });
}
