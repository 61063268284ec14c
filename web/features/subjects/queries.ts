import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { subjectDetailSchema, subjectListSchema } from '../../../api/contracts/subjects.ts';
import { api, type Query } from '../../app/api.ts';

export const subjectsPath = (study: string) => `/api/studies/${study}/subjects`;

export function subjectsQueryOptions(study: string, query: Query) {
  return queryOptions({
    queryKey: ['subjects', study, query],
    queryFn: ({ signal }) => api(subjectsPath(study), { answer: subjectListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function subjectQueryOptions(study: string, subject: string) {
  return queryOptions({
    queryKey: ['subject', study, subject],
    queryFn: ({ signal }) =>
      api(`${subjectsPath(study)}/${subject}`, { answer: subjectDetailSchema, signal }),
  });
}
