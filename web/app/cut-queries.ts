/** Cuts as several features read them: to list, to check, to filter records by. */
import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { cutDetailSchema, cutListSchema } from '../../api/contracts/cuts.ts';
import { api, type Query } from './api.ts';

export const cutsPath = (study: string) => `/api/studies/${study}/cuts`;
export const cutPath = (study: string, cut: string) => `${cutsPath(study)}/${cut}`;

export function cutsQueryOptions(study: string, query: Query) {
  return queryOptions({
    queryKey: ['cuts', study, query],
    queryFn: ({ signal }) => api(cutsPath(study), { answer: cutListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

/** The newest cuts, to choose one of. */
export function cutChoicesQueryOptions(study: string) {
  return cutsQueryOptions(study, { page: 1, pageSize: 200, sort: 'number', direction: 'desc' });
}

/** A cut never changes, so it is read once. */
export function cutQueryOptions(study: string, cut: string) {
  return queryOptions({
    queryKey: ['cut', study, cut],
    queryFn: ({ signal }) => api(cutPath(study, cut), { answer: cutDetailSchema, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  });
}
