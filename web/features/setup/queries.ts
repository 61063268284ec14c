import { queryOptions } from '@tanstack/react-query';
import { setupViewSchema } from '../../../api/contracts/setup.ts';
import { api } from '../../app/api.ts';

export function setupQueryOptions(study: string) {
  return queryOptions({
    queryKey: ['setup', study],
    queryFn: ({ signal }) =>
      api(`/api/studies/${study}/setup`, { answer: setupViewSchema, signal }),
  });
}
