import {
  columnVisibilityFeature,
  createSortedRowModel,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { useVirtualizer } from '@tanstack/react-virtual';
import { type ReactNode, useMemo, useRef, useState } from 'react';
import { sentenceOf } from '../../app/problem.ts';
import { words } from '../../words/en.ts';
import { saveFile, toCsv } from '../csv.ts';
import { notify } from '../notices.tsx';
import { type Column, compareCells, type Filter, headingOf } from './column.ts';
import { FilterLine } from './filter-line.tsx';
import { Pages } from './pages.tsx';
import { DataRow, HeadingCell } from './row.tsx';
import { moveBetweenRows } from './row-keys.ts';
import { type Sort, useTableState } from './table-state.ts';
import { TableTools } from './table-tools.tsx';
import { useOverflow } from './use-overflow.ts';

type AnyRow = object;
const features = tableFeatures({
  rowSortingFeature,
  columnVisibilityFeature,
  sortedRowModel: createSortedRowModel(),
});
const VIRTUAL_FROM = 200;
const DENSE = 'tetherline.dense';

export type DataTableProps<Row extends AnyRow> = {
  /** Names the exported file. */
  name: string;
  /** Says what the table holds, to those who hear it. */
  caption: string;
  /** One row and several, in words: ['subject', 'subjects']. */
  noun: readonly [string, string];
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  filters?: readonly Filter<Row>[];
  initialSort?: Sort;
  /** Tells apart two tables of one page in the address. */
  prefix?: string;
  /**
   * Where the server sorts, filters and pages. The file of the view then comes from `allRows`,
   * or from `exportCsv` where the server makes it.
   */
  server?: {
    total: number;
    pageSize: number;
    allRows?: () => Promise<readonly Row[]>;
    exportCsv?: () => void;
  };
  /** Picking a row, for a subject that is picked everywhere on the page. */
  picked?: string | null;
  onPick?: (id: string) => void;
  /** Shown in place of the table where there are no rows and no filter is set. */
  empty?: ReactNode;
  /** A short table inside a document: neither filters nor tools. */
  plain?: boolean;
  /** Totals, above the rows. */
  totals?: ReactNode;
};

export function DataTable<Row extends AnyRow>(props: DataTableProps<Row>) {
  const { columns, rows, rowId, filters = [], server } = props;
  const control = useTableState({
    filters: filters.map(({ id }) => id),
    initialSort: props.initialSort,
    prefix: props.prefix,
  });
  const [dense, setDense] = useState(() => localStorage.getItem(DENSE) === 'yes');
  const frame = useRef<HTMLDivElement>(null);
  const wide = useOverflow(frame);

  const fitting = useMemo(() => {
    if (server) return [...rows];
    return rows.filter((row) =>
      filters.every((filter) => {
        const value = control.filters[filter.id];
        return !value || (filter.matches?.(row, value) ?? true);
      }),
    );
  }, [rows, filters, control.filters, server]);

  const shown = control.columns ?? columns.filter(({ hidden }) => !hidden).map(({ id }) => id);
  const definitions = useMemo(
    () =>
      columns.map((column) => ({
        id: column.id,
        accessorFn: (row: Row) => column.value(row),
        enableSorting: column.sortable ?? !server,
        sortFn: (a: { original: Row }, b: { original: Row }) =>
          compareCells(column.value(a.original), column.value(b.original)),
      })),
    [columns, server],
  );
  const table = useTable({
    features,
    columns: definitions,
    data: fitting,
    getRowId: rowId,
    manualSorting: server !== undefined,
    enableSortingRemoval: false,
    state: {
      sorting: control.sort ? [{ id: control.sort.id, desc: control.sort.down }] : [],
      columnVisibility: Object.fromEntries(
        columns.map(({ id }, index) => [id, index === 0 || shown.includes(id)]),
      ),
    },
  });

  const byId = new Map(columns.map((column) => [column.id, column]));
  const visible = table.getVisibleLeafColumns().flatMap(({ id }) => byId.get(id) ?? []);
  const sorted = table.getRowModel().rows;
  const virtual = sorted.length > VIRTUAL_FROM;
  const virtualizer = useVirtualizer({
    count: virtual ? sorted.length : 0,
    getScrollElement: () => frame.current,
    estimateSize: () => (dense ? 28 : 36),
    overscan: 20,
  });
  const windowed = virtual ? virtualizer.getVirtualItems() : null;
  const before = windowed?.[0]?.start ?? 0;
  const after = windowed ? virtualizer.getTotalSize() - (windowed.at(-1)?.end ?? 0) : 0;
  const drawn = windowed ? windowed.flatMap(({ index }) => sorted[index] ?? []) : sorted;
  const first = windowed?.[0]?.index ?? 0;

  async function exportView() {
    if (server?.exportCsv) return server.exportCsv();
    const exported = visible.filter((column) => !column.notExported);
    const all = server?.allRows ? await server.allRows() : sorted.map(({ original }) => original);
    saveFile(
      `${props.name}.csv`,
      toCsv([
        exported.map((column) => column.exportHeading ?? headingOf(column)),
        ...all.map((row) => exported.map((column) => column.value(row))),
      ]),
    );
  }

  function sortBy(column: Column<Row>) {
    const down = control.sort?.id === column.id ? !control.sort.down : false;
    control.setSort({ id: column.id, down });
    notify(words.table.sortNotice(column.heading, down));
  }

  const filtered = Object.keys(control.filters).length > 0;
  if (rows.length === 0 && !filtered && props.empty) return props.empty;
  const total = server ? server.total : rows.length;
  const boxed = wide || virtual;

  return (
    <div>
      {props.plain ? null : (
        <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
          <FilterLine
            filters={filters}
            control={control}
            count={words.table.shown(server ? server.total : fitting.length, total, props.noun)}
          />
          <TableTools
            columns={columns}
            shown={shown}
            setShown={control.setColumns}
            dense={dense}
            setDense={(next) => {
              localStorage.setItem(DENSE, next ? 'yes' : 'no');
              setDense(next);
            }}
            exportCsv={() => {
              exportView().catch((error) => notify(sentenceOf(error), { urgent: true }));
            }}
          />
        </div>
      )}
      <div
        ref={frame}
        className="table-frame overflow-x-clip"
        data-boxed={boxed}
        {...(boxed ? { role: 'region', tabIndex: 0, 'aria-label': props.caption } : {})}
      >
        <table
          className="table"
          data-dense={dense}
          data-narrow="true"
          role={props.onPick ? 'grid' : undefined}
          aria-label={props.caption}
          aria-rowcount={virtual ? sorted.length + 1 : undefined}
        >
          <thead>
            <tr>
              {visible.map((column) => (
                <HeadingCell
                  key={column.id}
                  column={column}
                  sort={control.sort?.id === column.id ? control.sort : null}
                  sortable={table.getColumn(column.id)?.getCanSort() ?? false}
                  onSort={() => sortBy(column)}
                />
              ))}
            </tr>
          </thead>
          <tbody onKeyDown={moveBetweenRows}>
            {props.totals}
            {before > 0 ? <Spacer height={before} columns={visible.length} /> : null}
            {drawn.map((row, index) => (
              <DataRow
                key={row.id}
                id={row.id}
                row={row.original}
                columns={visible}
                index={virtual ? first + index + 2 : undefined}
                reachable={row.id === props.picked || (!props.picked && index === 0)}
                picked={row.id === props.picked}
                onPick={props.onPick}
              />
            ))}
            {after > 0 ? <Spacer height={after} columns={visible.length} /> : null}
          </tbody>
        </table>
        {sorted.length === 0 ? (
          <p className="border-b border-line py-4 text-faded">{words.table.nothing}</p>
        ) : null}
      </div>
      {server ? (
        <Pages
          page={control.page}
          pageSize={server.pageSize}
          total={server.total}
          setPage={control.setPage}
        />
      ) : null}
    </div>
  );
}

/** Holds the place of rows that are not drawn. */
function Spacer({ height, columns }: { height: number; columns: number }) {
  return (
    <tr>
      <td colSpan={columns} style={{ height, padding: 0, border: 0 }} />
    </tr>
  );
}
