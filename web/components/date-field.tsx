import type { ComponentProps } from 'react';
import { formatDay } from './dates.ts';
import { TextField } from './text-field.tsx';

type DateFieldProps = Omit<ComponentProps<typeof TextField>, 'type' | 'inputMode' | 'reading'>;

/**
 * A calendar day as `YYYY-MM-DD`. The browser shows it in its own order of day and month,
 * so the day stands in words at the right: 03/04 can't be misread.
 */
export function DateField({ width = 14, ...rest }: DateFieldProps) {
  return (
    <TextField
      {...rest}
      type="date"
      mono
      width={width}
      reading={rest.value ? formatDay(rest.value) : undefined}
    />
  );
}
