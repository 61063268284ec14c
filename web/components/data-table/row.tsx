import type { ReactNode } from 'react';
import type { Column } from './column.ts';
import type { Sort } from './table-state.ts';

const NONE = '\u2014';

/** The heading of a column; sortable ones are buttons and say how they are sorted. */
export function HeadingCell<Row>(props: {
  column: Column<Row>;
  sort: Sort | null;
  sortable: boolean;
  onSort: () => void;
}) {
  const { column, sort } = props;
  // One piece: in a numeric heading the mark of sorting stands before it, the unit never does.
  const text = (
    <span>
      {column.heading}
      {column.unit ? <span className="font-normal">, {column.unit}</span> : null}
    </span>
  );
  return (
    <th
      scope="col"
      className={`${column.numeric ? 'numeric' : ''} ${column.grow ? 'w-full' : ''}`}
      aria-sort={sort ? (sort.down ? 'descending' : 'ascending') : undefined}
    >
      {props.sortable ? (
        <button
          type="button"
          className={`inline-flex min-h-6 items-baseline gap-1 text-left font-semibold whitespace-nowrap hover:text-ink ${column.numeric ? 'flex-row-reverse' : ''}`}
          onClick={props.onSort}
        >
          {text}
          <svg
            aria-hidden="true"
            width="8"
            height="8"
            viewBox="0 0 8 8"
            className={sort ? 'text-ink' : 'opacity-0'}
          >
            <path d={sort?.down ? 'M0 2h8L4 7z' : 'M0 6h8L4 1z'} fill="currentColor" />
          </svg>
        </button>
      ) : (
        text
      )}
      {column.headingExtra}
    </th>
  );
}

/** One row. With `onPick` the row itself can be reached and picked with the keyboard. */
export function DataRow<Row>(props: {
  id: string;
  row: Row;
  columns: readonly Column<Row>[];
  index?: number;
  reachable: boolean;
  picked: boolean;
  onPick?: (id: string) => void;
}) {
  const { id, row, columns, onPick } = props;
  return (
    <tr
      data-row={id}
      aria-rowindex={props.index}
      aria-selected={onPick ? props.picked : undefined}
      tabIndex={onPick ? (props.reachable ? 0 : -1) : undefined}
      className={onPick ? 'cursor-pointer' : undefined}
      onClick={onPick ? () => onPick(id) : undefined}
      onKeyDown={
        onPick
          ? (event) => {
              if (event.target !== event.currentTarget) return;
              if (event.key !== 'Enter' && event.key !== ' ') return;
              event.preventDefault();
              onPick(id);
            }
          : undefined
      }
    >
      {columns.map((column, index) => {
        const content = contentOf(column, row);
        const place = column.place ?? (index === 0 ? 'first' : 'fact');
        const shared = {
          className: column.numeric ? 'numeric' : undefined,
          'data-place': place,
          'data-heading': column.unit ? `${column.heading}, ${column.unit}` : column.heading,
        };
        return index === 0 ? (
          <th key={column.id} scope="row" {...shared}>
            {content}
          </th>
        ) : (
          <td key={column.id} {...shared}>
            {content}
          </td>
        );
      })}
    </tr>
  );
}

function contentOf<Row>(column: Column<Row>, row: Row): ReactNode {
  if (column.cell) return column.cell(row);
  const value = column.value(row);
  return value === null || value === undefined || value === '' ? NONE : String(value);
}
