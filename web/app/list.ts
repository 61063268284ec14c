/** Lists that the server sorts, filters and pages. */
import type { z } from 'zod';
import type { TableControl } from '../components/data-table/table-state.ts';
import { api, type Query } from './api.ts';

const PAGE_MOST = 200;

/** The query of a list from the state of its table. */
export function listQuery(control: TableControl, pageSize: number): Query {
  return {
    page: control.page,
    pageSize,
    sort: control.sort?.id,
    direction: control.sort ? (control.sort.down ? 'desc' : 'asc') : undefined,
    ...control.filters,
  };
}

/** Every row of a view, page after page: for its file. @throws ApiProblem */
export async function allRows<Row>(
  path: string,
  answer: z.ZodType<{ rows: Row[]; total: number }>,
  query: Query,
): Promise<Row[]> {
  const rows: Row[] = [];
  for (let page = 1; ; page += 1) {
    const part = await api(path, { answer, query: { ...query, page, pageSize: PAGE_MOST } });
    rows.push(...part.rows);
    if (part.rows.length === 0 || rows.length >= part.total) return rows;
  }
}
