/**
 * Reads the bytes of a delimited file before any parser does. A parser given a binary file, an endless
 * line or a quote that never closes gathers the rest of the file into one cell; this stops at the place.
 */
import { isUtf8 } from 'node:buffer';
import { Transform, type TransformCallback } from 'node:stream';
import { FileProblem } from './file-problem.ts';

const LF = 10;
const CR = 13;
const QUOTE = 34;
const SEPARATORS = new Set([44, 59, 9]);
/** A long CSV row is tens of bytes; a line this long is another kind of file. */
export const LONGEST_LINE_BYTES = 64 * 1024;

export class ByteScanner extends Transform {
  private line = 1;
  private column = 0;
  private inQuote = false;
  private quoteLine = 0;
  private quoteColumn = 0;
  private quoteBytes = 0;
  private previous = LF;
  private first = true;
  private readonly decoder = new TextDecoder('utf-8', { fatal: true });

  /** Lines seen so far, blank ones too. */
  get lines(): number {
    return this.line;
  }

  constructor() {
    super({ readableObjectMode: false, decodeStrings: true, encoding: 'utf8' });
  }

  override _transform(chunk: Buffer, _encoding: BufferEncoding, done: TransformCallback): void {
    try {
      const bytes = this.first ? this.openingBytes(chunk) : chunk;
      this.first = false;
      const lineAtStart = this.line;
      this.scan(bytes);
      done(null, this.decode(bytes, lineAtStart));
    } catch (error) {
      done(error as Error);
    }
  }

  override _flush(done: TransformCallback): void {
    if (this.inQuote) {
      done(new FileProblem('file_open_quote', { line: this.quoteLine, column: this.quoteColumn }));
      return;
    }
    try {
      done(null, this.decoder.decode());
    } catch {
      // The last character is cut off: its line is where reading stopped.
      done(new FileProblem('file_not_utf8', { line: this.line, column: this.column }));
    }
  }

  private openingBytes(chunk: Buffer): Buffer {
    if (chunk.length >= 2) {
      const [a, b] = chunk;
      if ((a === 0xff && b === 0xfe) || (a === 0xfe && b === 0xff))
        throw new FileProblem('file_utf16');
      if (a === 0x50 && b === 0x4b) throw new FileProblem('file_workbook');
    }
    if (chunk.length >= 3 && chunk[0] === 0xef && chunk[1] === 0xbb && chunk[2] === 0xbf) {
      return chunk.subarray(3);
    }
    return chunk;
  }

  private decode(bytes: Buffer, lineAtStart: number): string {
    try {
      return this.decoder.decode(bytes, { stream: true });
    } catch {
      const place = placeOfInvalidUtf8(bytes, lineAtStart);
      throw new FileProblem('file_not_utf8', place);
    }
  }

  private scan(bytes: Buffer): void {
    for (const byte of bytes) {
      this.column += 1;
      if (byte === 0)
        throw new FileProblem('file_nul_byte', { line: this.line, column: this.column });
      this.trackQuote(byte);
      if (byte === LF) {
        if (this.previous !== CR) this.line += 1;
        this.column = 0;
      } else if (byte === CR) {
        this.line += 1;
        this.column = 0;
      } else if (this.column > LONGEST_LINE_BYTES) {
        throw new FileProblem('file_line_too_long', {
          line: this.line,
          kilobytes: LONGEST_LINE_BYTES / 1024,
        });
      }
      this.previous = byte;
    }
  }

  /** Only a quote at the start of a cell opens one: an inch mark inside a cell is text. */
  private trackQuote(byte: number): void {
    if (this.inQuote) {
      this.quoteBytes += 1;
      if (byte === QUOTE) this.inQuote = false;
      else if (this.quoteBytes > LONGEST_LINE_BYTES) {
        throw new FileProblem('file_open_quote', {
          line: this.quoteLine,
          column: this.quoteColumn,
        });
      }
    } else if (byte === QUOTE) {
      const opens = this.previous === LF || this.previous === CR || SEPARATORS.has(this.previous);
      // A doubled quote inside a quoted cell closes and opens again at once.
      const continues = this.previous === QUOTE && this.quoteBytes > 0;
      if (opens || continues) {
        this.inQuote = true;
        if (opens) {
          this.quoteLine = this.line;
          this.quoteColumn = this.column;
          this.quoteBytes = 0;
        }
      }
    }
  }
}

function placeOfInvalidUtf8(bytes: Buffer, lineAtStart: number): { line: number; column: number } {
  let line = lineAtStart;
  // A character may have begun in the piece before: its remaining bytes are none of this piece's faults.
  let start = 0;
  while (start < 3 && isContinuation(bytes[start])) start += 1;
  for (let index = start; index <= bytes.length; index += 1) {
    if (index < bytes.length && bytes[index] !== LF) continue;
    const piece = bytes.subarray(start, index);
    if (!isUtf8(piece)) {
      let valid = piece.length - 1;
      while (valid > 0 && !isUtf8(piece.subarray(0, valid))) valid -= 1;
      return { line, column: valid + 1 };
    }
    start = index + 1;
    line += 1;
  }
  return { line: lineAtStart, column: 1 };
}

function isContinuation(byte: number | undefined): boolean {
  return byte !== undefined && byte >= 0x80 && byte < 0xc0;
}
