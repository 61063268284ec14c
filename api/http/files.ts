/** Answers that are files. */
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';

interface FileAnswer {
  /** What the browser proposes; letters outside ASCII are kept by the second spelling of RFC 6266. */
  name: string;
  /** Media type with its charset. */
  type: string;
  content: Readable | AsyncIterable<Uint8Array | string> | string | Uint8Array;
  /** Further headers, such as a hash of the content. */
  headers?: Record<string, string>;
}

/** Streams a file to the caller; a caller who leaves ends the source too. */
export async function sendFile(res: Response, file: FileAnswer): Promise<void> {
  const plain = file.name.replace(/[^A-Za-z0-9._ -]/g, '_');
  res.set({
    'Content-Type': file.type,
    'Content-Disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(file.name)}`,
    ...file.headers,
  });
  if (typeof file.content === 'string' || file.content instanceof Uint8Array) {
    res.send(typeof file.content === 'string' ? file.content : Buffer.from(file.content));
    return;
  }
  try {
    await pipeline(Readable.from(file.content), res);
  } catch (error) {
    // The caller left in the middle: nothing is wrong on this side.
    if ((error as NodeJS.ErrnoException).code === 'ERR_STREAM_PREMATURE_CLOSE') return;
    throw error;
  }
}

/** One line of CSV (RFC 4180); a cell that a spreadsheet would calculate is neutralised. */
export function csvLine(cells: readonly (string | number | null)[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`;
}

function csvCell(cell: string | number | null): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return String(cell);
  const safe = /^[=+\-@\t\r]/.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
