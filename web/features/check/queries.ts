import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { acknowledgementSchema, checkSchema } from '../../../api/contracts/analysis.ts';
import { api, newIdempotencyKey } from '../../app/api.ts';
import { cutPath } from '../../app/cut-queries.ts';
import type { Question } from '../../app/specification-address.ts';

/** Opening the check is an act that the trail keeps, so it is sent once a question and not again by itself. */
export function checkQueryOptions(study: string, { cut, specification }: Question) {
  return queryOptions({
    queryKey: ['check', study, cut, specification],
    queryFn: ({ signal }) =>
      api(`${cutPath(study, cut)}/check`, {
        method: 'POST',
        body: { specification },
        answer: checkSchema,
        signal,
      }),
    staleTime: Number.POSITIVE_INFINITY,
    retry: false,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });
}

export function useAcknowledge(study: string, question: Question) {
  const client = useQueryClient();
  const { queryKey } = checkQueryOptions(study, question);
  return useMutation({
    mutationFn: (reason: string) =>
      api(`${cutPath(study, question.cut)}/acknowledgements`, {
        method: 'POST',
        body: { specification: question.specification, reason },
        answer: acknowledgementSchema,
        idempotencyKey: newIdempotencyKey(),
      }),
    onSuccess: (acknowledgement) => {
      client.setQueryData(queryKey, (check) =>
        check ? { ...check, lock: { locked: false, acknowledgement } } : check,
      );
    },
  });
}
