import type { ReactNode } from 'react';
import type { CsvCell } from '../csv.ts';
import type { Choice } from '../select.tsx';

/** A column of a table of `Row`s. */
export type Column<Row> = {
  id: string;
  heading: string;
  /** The heading in the exported file, where scripts look for a fixed name. */
  exportHeading?: string;
  /** Stands under the heading: the axis of a picture in the cells. */
  headingExtra?: ReactNode;
  /** Stands after the heading, and in the heading of the exported file. */
  unit?: string;
  /** What is shown; by default the value as text. */
  cell?: (row: Row) => ReactNode;
  /** What is sorted by and exported: the plain value. */
  value: (row: Row) => CsvCell;
  /** In a table sorted by the server, only columns that the server can sort by. */
  sortable?: boolean;
  /** Right-aligned, tabular figures. */
  numeric?: boolean;
  /** Offered under "Columns" but not shown at first. */
  hidden?: boolean;
  /** Can't be taken away. The first column never can. */
  fixed?: boolean;
  /** A picture or an act: nothing of it is exported. */
  notExported?: boolean;
  /** A column that takes all the width left. */
  grow?: boolean;
  /** Its place in a narrow row; by default the first column is `first` and others `fact`. */
  place?: 'first' | 'wide' | 'fact' | 'act' | 'hidden';
};

/** A part of the sentence over the table. */
export type Filter<Row> = {
  id: string;
  label: string;
  /** Without choices the filter is text typed in, or a day. */
  choices?: readonly Choice[];
  day?: boolean;
  /** Not needed where the server filters. */
  matches?: (row: Row, value: string) => boolean;
};

export function headingOf(column: Pick<Column<never>, 'heading' | 'unit'>): string {
  return column.unit ? `${column.heading}, ${column.unit}` : column.heading;
}

/** Numbers by size, words by the alphabet with figures in them read as numbers, nothing last. */
export function compareCells(a: CsvCell, b: CsvCell): number {
  const missingA = a === null || a === undefined || a === '';
  const missingB = b === null || b === undefined || b === '';
  if (missingA || missingB) return Number(missingA) - Number(missingB);
  if (typeof a === 'number' && typeof b === 'number') return a - b;
  return COLLATOR.compare(String(a), String(b));
}

const COLLATOR = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });
