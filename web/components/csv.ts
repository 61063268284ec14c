/** CSV as spreadsheets may open it: text that a sheet would run as a formula is made harmless. */
export type CsvCell = string | number | boolean | null | undefined;

function field(cell: CsvCell): string {
  if (cell === null || cell === undefined) return '';
  if (typeof cell !== 'string') return String(cell);
  const harmless = /^[=+\-@\t\r]/.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}

/** Rows of cells as CSV text with CRLF ends. */
export function toCsv(rows: readonly (readonly CsvCell[])[]): string {
  return rows
    .map((row) => row.map(field).join(','))
    .join('\r\n')
    .concat('\r\n');
}

/** Hands a file made in the page to the person. */
export function saveFile(name: string, content: string | Blob, type = 'text/csv'): void {
  const blob = typeof content === 'string' ? new Blob([content], { type }) : content;
  const address = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // The browser needs the address until the download has begun.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
