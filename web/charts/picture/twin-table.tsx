/** The data of a picture as a table; only the rows in view are drawn once there are many. */
import { useVirtualizer } from '@tanstack/react-virtual';
import { useRef } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { formatLoose, formatNumber } from '../../words/numbers.ts';
import type { TwinTable as Twin, TwinCell } from './types.ts';

const ROW = 28;
const ALL_AT_ONCE = 200;
/** A box that scrolls has to be reached by the keyboard, although nothing in it acts. */
const SCROLLED_BY_KEYS = { tabIndex: 0 } as const;

function shown(cell: TwinCell, decimals: number | undefined): string {
  if (typeof cell === 'number')
    return decimals === undefined ? formatLoose(cell) : formatNumber(cell, decimals);
  return cell ?? '\u2014';
}

export function TwinTable({
  table,
  title,
  stamp,
}: {
  table: Twin;
  title: string;
  stamp: string | null;
}) {
  const box = useRef<HTMLElement>(null);
  const many = table.rows.length > ALL_AT_ONCE;
  const virtual = useVirtualizer({
    count: table.rows.length,
    getScrollElement: () => box.current,
    estimateSize: () => ROW,
    overscan: 12,
    enabled: many,
  });
  const items = many
    ? virtual.getVirtualItems().map((item) => item.index)
    : table.rows.map((_, index) => index);
  const above = many ? (virtual.getVirtualItems()[0]?.start ?? 0) : 0;
  const below = many ? virtual.getTotalSize() - (virtual.getVirtualItems().at(-1)?.end ?? 0) : 0;
  return (
    <section
      ref={box}
      aria-label={title}
      {...SCROLLED_BY_KEYS}
      className="table-frame max-h-[420px] overflow-auto"
    >
      <table className="table" data-dense="true" aria-rowcount={table.rows.length + 1}>
        <caption className="py-1 text-left text-13 text-faded">
          {stamp && <span className="font-semibold text-flare-ink">{stamp}. </span>}
          {chartsWords.figure.rows(table.rows.length)}
        </caption>
        <thead>
          <tr>
            {table.columns.map((column) => (
              <th key={column.name} scope="col" className={column.numeric ? 'numeric' : undefined}>
                {column.unit ? `${column.name}, ${column.unit}` : column.name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {above > 0 && <Filler height={above} />}
          {items.map((index) => (
            <tr key={index} aria-rowindex={index + 2}>
              {table.columns.map((column, place) => (
                <td key={column.name} className={column.numeric ? 'numeric' : undefined}>
                  {shown(table.rows[index]?.[place] ?? null, column.decimals)}
                </td>
              ))}
            </tr>
          ))}
          {below > 0 && <Filler height={below} />}
        </tbody>
      </table>
    </section>
  );
}

function Filler({ height }: { height: number }) {
  return (
    <tr>
      <td style={{ height, padding: 0, border: 0 }} />
    </tr>
  );
}
