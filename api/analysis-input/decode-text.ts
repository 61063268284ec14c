import { LongCsvError } from './long-csv-error.ts';

const NEWLINE = 10;

function lineAt(bytes: Uint8Array, position: number): number {
  let line = 1;
  for (let k = 0; k < position; k++) if (bytes[k] === NEWLINE) line++;
  return line;
}

function isUtf8(bytes: Uint8Array): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return true;
  } catch (error) {
    if (error instanceof TypeError) return false;
    throw error;
  }
}

function firstLineThatIsNotUtf8(bytes: Uint8Array): number {
  let from = 0;
  let line = 1;
  while (from < bytes.length) {
    const end = bytes.indexOf(NEWLINE, from);
    const to = end === -1 ? bytes.length : end;
    if (!isUtf8(bytes.subarray(from, to))) return line;
    from = to + 1;
    line++;
  }
  return line;
}

/**
 * Decodes the bytes of a text file, UTF-8 with or without a byte-order mark, every line end as LF.
 *
 * @throws LongCsvError empty, binary, not_utf8
 */
export function decodeText(bytes: Uint8Array): string {
  const nul = bytes.indexOf(0);
  if (nul !== -1) throw new LongCsvError('binary', { line: lineAt(bytes, nul) }, undefined);
  if (!isUtf8(bytes)) {
    throw new LongCsvError('not_utf8', { line: firstLineThatIsNotUtf8(bytes) }, undefined);
  }
  const text = new TextDecoder('utf-8').decode(bytes).replaceAll(/\r\n?/g, '\n');
  if (text.trim() === '') throw new LongCsvError('empty', {}, undefined);
  return text;
}
