import type { ReactNode } from 'react';
import { FieldError, Label, Text } from 'react-aria-components';
import { words } from '../words/en.ts';

/** What every field has: a label above, a hint under it, a message with its mend, the value before. */
export type FieldWords = {
  label: string;
  hint?: ReactNode;
  /** Why the entry is refused and what mends it. */
  error?: string;
  /** Required is the rule; this says otherwise. */
  optional?: boolean;
  /** The value before the change, at the right of the field. */
  previous?: string;
};

export function FieldLabel({ label, optional, hint }: FieldWords) {
  return (
    <>
      <Label className="block text-15 font-semibold">
        {label}
        {optional ? (
          <span className="font-normal text-faded"> ({words.common.optional})</span>
        ) : null}
      </Label>
      {hint ? (
        <Text slot="description" className="block max-w-text text-13 text-faded">
          {hint}
        </Text>
      ) : null}
    </>
  );
}

export function FieldMessage({ error }: { error?: string }) {
  return (
    <FieldError className="mt-1 block max-w-text border-l-4 border-stop pl-2 text-15 text-stop">
      {error}
    </FieldError>
  );
}

export function FieldRow({ previous, children }: { previous?: string; children: ReactNode }) {
  return (
    <div className="mt-1 flex flex-wrap items-center gap-3">
      {children}
      {previous ? (
        <span className="figure text-13 text-faded">{words.common.previous(previous)}</span>
      ) : null}
    </div>
  );
}
