import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type RunFitRequest, recordDetailSchema } from '../../../api/contracts/analysis.ts';
import { api } from '../../app/api.ts';
import { cutPath } from '../../app/cut-queries.ts';

export function useRunFit(study: string, cut: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, key }: { body: RunFitRequest; key: string }) =>
      api(`${cutPath(study, cut)}/fits`, {
        method: 'POST',
        body,
        answer: recordDetailSchema,
        idempotencyKey: key,
      }),
    onSuccess: async (record) => {
      client.setQueryData(['record', study, record.id], record);
      await client.invalidateQueries({ queryKey: ['records', study] });
    },
  });
}
