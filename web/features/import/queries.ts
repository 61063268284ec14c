import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type ImportMapping,
  type ImportView,
  implausibleRowsSchema,
  importChoicesSchema,
  importListSchema,
  importSchema,
  refusedRowsSchema,
} from '../../../api/contracts/imports.ts';
import { api, type Query } from '../../app/api.ts';

export const importsPath = (study: string) => `/api/studies/${study}/imports`;
const importPath = (study: string, id: string) => `${importsPath(study)}/${id}`;

export function importChoicesQueryOptions(study: string) {
  return queryOptions({
    queryKey: ['import-choices', study],
    queryFn: ({ signal }) =>
      api(`${importsPath(study)}/choices`, { answer: importChoicesSchema, signal }),
  });
}

export function importsQueryOptions(study: string, query: Query) {
  return queryOptions({
    queryKey: ['imports', study, query],
    queryFn: ({ signal }) => api(importsPath(study), { answer: importListSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function importQueryOptions(study: string, id: string) {
  return queryOptions({
    queryKey: ['import', study, id],
    queryFn: ({ signal }) => api(importPath(study, id), { answer: importSchema, signal }),
  });
}

/** Refused and implausible rows belong to one dry run, so its version is part of the key. */
export function refusalsQueryOptions(study: string, view: ImportView, query: Query) {
  return queryOptions({
    queryKey: ['import', study, view.id, 'refusals', view.version, query],
    queryFn: ({ signal }) =>
      api(`${importPath(study, view.id)}/refusals`, { answer: refusedRowsSchema, query, signal }),
    placeholderData: keepPreviousData,
  });
}

export function implausibleQueryOptions(study: string, view: ImportView, query: Query) {
  return queryOptions({
    queryKey: ['import', study, view.id, 'implausible', view.version, query],
    queryFn: ({ signal }) =>
      api(`${importPath(study, view.id)}/implausible`, {
        answer: implausibleRowsSchema,
        query,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

export const refusalsFile = (study: string, id: string) => `${importPath(study, id)}/refusals.csv`;

function useImportAct<Input>(study: string, act: (input: Input) => Promise<ImportView>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSuccess: (view) => client.setQueryData(importQueryOptions(study, view.id).queryKey, view),
    onSettled: () => client.invalidateQueries({ queryKey: ['imports', study] }),
  });
}

/** The same for every try from one state of the import: a second try after a lost answer acts once. */
const keyOf = (act: 'check' | 'apply', { id, version }: ImportView) => `${act}-${id}-${version}`;

export function useUpload(study: string) {
  return useImportAct(study, ({ measure, file }: { measure: string; file: File }) => {
    const form = new FormData();
    form.set('measure', measure);
    form.set('file', file);
    return api(importsPath(study), { method: 'POST', form, answer: importSchema });
  });
}

export function useCheckImport(study: string) {
  return useImportAct(study, ({ view, mapping }: { view: ImportView; mapping: ImportMapping }) =>
    api(`${importPath(study, view.id)}/check`, {
      method: 'POST',
      body: { mapping, version: view.version },
      idempotencyKey: keyOf('check', view),
      answer: importSchema,
    }),
  );
}

type ApplyInput = { view: ImportView; keepImplausible: boolean; explanation: string | null };

export function useApplyImport(study: string) {
  return useImportAct(study, ({ view, ...body }: ApplyInput) =>
    api(`${importPath(study, view.id)}/apply`, {
      method: 'POST',
      body: { ...body, version: view.version },
      idempotencyKey: keyOf('apply', view),
      answer: importSchema,
    }),
  );
}

export function useCancelImport(study: string) {
  return useImportAct(study, (id: string) =>
    api(`${importPath(study, id)}/cancel`, { method: 'POST', answer: importSchema }),
  );
}
