/** The data of a picture as CSV: safe to open in a spreadsheet, and stamped where the picture is. */
import type { TwinCell, TwinTable } from '../picture/types.ts';

/** A cell that a spreadsheet would run as a formula gets an apostrophe; numbers stay numbers. */
function cell(value: TwinCell): string {
  if (value === null) return '';
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

export function csvFile(table: TwinTable, stamp: string | null): string {
  const head = table.columns.map((column) =>
    column.unit ? `${column.name}, ${column.unit}` : column.name,
  );
  const rows: TwinCell[][] = stamp
    ? [[...head, 'stamp'], ...table.rows.map((row) => [...row, stamp])]
    : [head, ...table.rows.map((row) => [...row])];
  return rows.map((row) => `${row.map(cell).join(',')}\r\n`).join('');
}
