/** Bytes of a delimited file → rows of cells with the line each begins on, in constant memory. */
import { createReadStream } from 'node:fs';
import { Transform, type TransformCallback } from 'node:stream';
import Papa from 'papaparse';
import { FileProblem } from './file-problem.ts';
import { ByteScanner } from './scan-bytes.ts';

export type Delimiter = ',' | ';' | '\t';
const DELIMITERS: Delimiter[] = [',', ';', '\t'];
export const MOST_COLUMNS = 200;

/** One kind of line end, so that a row is the same row whatever program saved the file. */
class OneLineEnd extends Transform {
  private heldReturn = false;

  constructor() {
    super({ decodeStrings: false, encoding: 'utf8' });
  }

  override _transform(
    chunk: Buffer | string,
    _encoding: BufferEncoding,
    done: TransformCallback,
  ): void {
    let text = (this.heldReturn ? '\r' : '') + chunk.toString();
    this.heldReturn = text.endsWith('\r');
    if (this.heldReturn) text = text.slice(0, -1);
    done(null, text.replace(/\r\n?/g, '\n'));
  }

  override _flush(done: TransformCallback): void {
    done(null, this.heldReturn ? '\n' : '');
  }
}

/** The delimiter that splits the first line into most cells; a comma where none does. */
export function findDelimiter(firstLine: string): Delimiter {
  let best: Delimiter = ',';
  let most = 1;
  for (const delimiter of DELIMITERS) {
    const [row] = Papa.parse<string[]>(firstLine, { delimiter }).data;
    if (row && row.length > most) {
      most = row.length;
      best = delimiter;
    }
  }
  return best;
}

export type FileRow = { cells: string[]; line: number; delimiter: Delimiter };

/**
 * @param path a file on this machine
 * @param delimiter what separates the cells; found from the first line when null
 * @throws FileProblem where rows can't be told apart
 */
export async function* rowsOf(path: string, delimiter: Delimiter | null): AsyncGenerator<FileRow> {
  const scanner = new ByteScanner();
  const oneEnd = new OneLineEnd();
  const source = createReadStream(path, { highWaterMark: 256 * 1024 });
  const fail = (error: Error) => {
    source.destroy();
    scanner.destroy();
    oneEnd.destroy(error);
  };
  source.on('error', fail);
  scanner.on('error', fail);
  source.pipe(scanner).pipe(oneEnd);

  let separator = delimiter;
  let pending = '';
  let line = 1;
  for await (const piece of oneEnd) {
    pending += String(piece);
    const end = lastRowEnd(pending);
    if (end < 0) continue;
    const block = pending.slice(0, end + 1);
    pending = pending.slice(end + 1);
    separator ??= findDelimiter(block.slice(0, block.indexOf('\n')));
    line = yield* rowsOfBlock(block, separator, line);
  }
  if (pending !== '') {
    separator ??= findDelimiter(pending);
    yield* rowsOfBlock(pending, separator, line);
  }
}

/** The last line end that is outside quotes; the scanner has already refused a quote left open. */
function lastRowEnd(text: string): number {
  let last = -1;
  let quoted = false;
  for (let index = 0; index < text.length; index += 1) {
    const letter = text.charCodeAt(index);
    if (letter === 34) {
      const before = index === 0 ? 10 : text.charCodeAt(index - 1);
      if (quoted) quoted = false;
      else if (before === 10 || before === 44 || before === 59 || before === 9 || before === 34) {
        quoted = true;
      }
    } else if (letter === 10 && !quoted) last = index;
  }
  return last;
}

function* rowsOfBlock(
  block: string,
  delimiter: Delimiter,
  from: number,
): Generator<FileRow, number> {
  let line = from;
  const text = block.endsWith('\n') ? block.slice(0, -1) : block;
  for (const cells of Papa.parse<string[]>(text, { delimiter, newline: '\n' }).data) {
    const begins = line;
    line += 1;
    for (const cell of cells) {
      for (let at = cell.indexOf('\n'); at >= 0; at = cell.indexOf('\n', at + 1)) line += 1;
    }
    const blank = cells.every((cell) => cell.trim() === '');
    if (!blank) yield { cells, line: begins, delimiter };
  }
  return line;
}

/** @throws FileProblem where the header can't serve */
export function readHeader(row: FileRow): string[] {
  const header = row.cells.map((cell) => cell.trim());
  if (header.length < 2) throw new FileProblem('file_one_column', { line: row.line });
  if (header.length > MOST_COLUMNS) {
    throw new FileProblem('file_too_many_columns', { columns: header.length, most: MOST_COLUMNS });
  }
  const seen = new Map<string, number>();
  for (const [index, name] of header.entries()) {
    if (name === '')
      throw new FileProblem('file_header_blank', { line: row.line, column: index + 1 });
    const earlier = seen.get(name);
    if (earlier !== undefined) {
      const params = { name, first: earlier + 1, second: index + 1 };
      throw new FileProblem('file_header_repeated', params);
    }
    seen.set(name, index);
  }
  return header;
}
