import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';

export type Sort = { id: string; down: boolean };

export type TableState = {
  sort: Sort | null;
  /** From 1. */
  page: number;
  /** Values by filter; a filter that is not set is absent. */
  filters: Readonly<Record<string, string>>;
  /** Columns chosen; null for the usual ones. */
  columns: readonly string[] | null;
};

export type TableStateOptions = {
  /** Names of the filters of this table. */
  filters?: readonly string[];
  initialSort?: Sort;
  /** Tells apart two tables of one page. */
  prefix?: string;
};

/** The state of a table lives in the address, so that a view can be sent to a colleague and found again. */
export function useTableState({ filters = [], initialSort, prefix = '' }: TableStateOptions) {
  const [params, setParams] = useSearchParams();
  const filterKey = filters.join(' ');

  const state = useMemo<TableState>(() => {
    const sort = params.get(`${prefix}sort`);
    const columns = params.get(`${prefix}columns`);
    const page = Number(params.get(`${prefix}page`) ?? 1);
    const values: Record<string, string> = {};
    for (const id of filterKey.split(' ')) {
      const value = id ? params.get(prefix + id) : null;
      if (value) values[id] = value;
    }
    return {
      sort: sort
        ? { id: sort.replace(/^-/, ''), down: sort.startsWith('-') }
        : (initialSort ?? null),
      page: Number.isInteger(page) && page > 0 ? page : 1,
      filters: values,
      columns: columns === null ? null : columns.split(','),
    };
  }, [params, prefix, filterKey, initialSort]);

  const set = useCallback(
    (changes: Readonly<Record<string, string | null>>) => {
      setParams(
        (before) => {
          const next = new URLSearchParams(before);
          for (const [name, value] of Object.entries(changes)) {
            if (value === null || value === '') next.delete(prefix + name);
            else next.set(prefix + name, value);
          }
          return next;
        },
        { replace: true, preventScrollReset: true },
      );
    },
    [setParams, prefix],
  );

  return {
    ...state,
    setSort: (sort: Sort) => set({ sort: `${sort.down ? '-' : ''}${sort.id}`, page: null }),
    setPage: (page: number) => set({ page: page === 1 ? null : String(page) }),
    setFilter: (id: string, value: string) => set({ [id]: value || null, page: null }),
    clearFilters: () => set(Object.fromEntries([...filters, 'page'].map((id) => [id, null]))),
    setColumns: (columns: readonly string[] | null) =>
      set({ columns: columns === null ? null : columns.join(',') }),
  };
}

export type TableControl = ReturnType<typeof useTableState>;
