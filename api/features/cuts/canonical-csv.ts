/** The bytes of a cut: the canonical CSV that its hash is taken of and that the engine reads. */
import { createHash } from 'node:crypto';
import type { CutRow } from './cut-shapes.ts';
import { numberText } from './number-text.ts';

/** Bytes are kept in pieces of about this size, so that no single row of the database grows large. */
const CHUNK_BYTES = 256 * 1024;

const FIXED_COLUMNS = [
  'subject',
  'site',
  'visit',
  'planned',
  'day',
  'planned_day',
  'replicate',
] as const;

/** Quotes only where RFC 4180 needs them: a comma, a quote or a line end inside the cell. */
function cell(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

function integerCell(value: number | null): string {
  return value === null ? '' : numberText(value);
}

/** The short names in the order of the columns: by code units. */
export function columnOrder(shortNames: readonly string[]): string[] {
  return [...new Set(shortNames)].sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
}

/**
 * Takes rows in their final order and yields UTF-8 chunks with their SHA-256, which is taken while the
 * bytes come in: the hash shown is of exactly what is stored and served.
 */
export class CanonicalCsvWriter {
  readonly #measures: readonly string[];
  readonly #withGroup: boolean;
  readonly #hash = createHash('sha256');
  readonly #chunks: Buffer[] = [];
  #pending: string[] = [];
  #pendingLength = 0;
  #rows = 0;

  /**
   * @param measures short names of the measures in the cut
   * @param withGroup only where groups are open to the readers of this cut
   */
  constructor(measures: readonly string[], withGroup: boolean) {
    this.#measures = columnOrder(measures);
    this.#withGroup = withGroup;
    const columns: string[] = [...FIXED_COLUMNS];
    if (withGroup) {
      columns.push('group');
    }
    for (const name of this.#measures) {
      columns.push(name, `${name}_note`);
    }
    this.#line(columns);
  }

  write(row: CutRow): void {
    const cells = [
      row.subject,
      row.site,
      row.visit,
      row.planned ? '1' : '0',
      integerCell(row.day),
      integerCell(row.plannedDay),
      integerCell(row.replicate),
    ];
    if (this.#withGroup) {
      cells.push(row.group ?? '');
    }
    for (const name of this.#measures) {
      const entry = row.cells.get(name);
      cells.push(entry?.text ?? '', entry?.note ?? '');
    }
    this.#rows += 1;
    this.#line(cells);
  }

  /** The chunks in order, their hash in lower-case hexadecimal, and the number of data rows. */
  finish(): { chunks: Buffer[]; sha256: string; rows: number } {
    this.#flush();
    return { chunks: this.#chunks, sha256: this.#hash.digest('hex'), rows: this.#rows };
  }

  #line(cells: readonly string[]): void {
    const line = `${cells.map(cell).join(',')}\n`;
    this.#pending.push(line);
    this.#pendingLength += line.length;
    if (this.#pendingLength >= CHUNK_BYTES) {
      this.#flush();
    }
  }

  #flush(): void {
    if (this.#pending.length === 0) {
      return;
    }
    const bytes = Buffer.from(this.#pending.join(''), 'utf8');
    this.#hash.update(bytes);
    this.#chunks.push(bytes);
    this.#pending = [];
    this.#pendingLength = 0;
  }
}
