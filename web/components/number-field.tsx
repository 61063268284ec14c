import type { ComponentProps } from 'react';
import { TextField } from './text-field.tsx';

type NumberFieldProps = Omit<ComponentProps<typeof TextField>, 'type' | 'inputMode' | 'mono'> & {
  /** Whole numbers only: a phone shows digits alone. */
  whole?: boolean;
};

/**
 * A number as it is typed. The text is kept as entered, so that a mistyped figure is questioned
 * and never silently rounded; `readNumber` turns it into a number.
 */
export function NumberField({ whole, width = 9, ...rest }: NumberFieldProps) {
  return <TextField {...rest} mono width={width} inputMode={whole ? 'numeric' : 'decimal'} />;
}

/** The number in a text: a point or one comma for decimals, U+2212 taken as minus; null where there is none. */
export function readNumber(text: string): number | null {
  const plain = text
    .trim()
    .replace('\u2212', '-')
    .replace(/[\u2009\u00a0 ]/g, '')
    .replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : null;
}
