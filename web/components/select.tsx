import {
  Select as AriaSelect,
  Button,
  ListBox,
  ListBoxItem,
  Popover,
  SelectValue,
} from 'react-aria-components';
import { words } from '../words/en.ts';
import { FieldLabel, FieldMessage, FieldRow, type FieldWords } from './field.tsx';

export type Choice = { value: string; label: string; note?: string };

type SelectProps = FieldWords & {
  /** The empty text while nothing is chosen. */
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  choices: readonly Choice[];
  name?: string;
  placeholder?: string;
  disabled?: boolean;
  inputRef?: React.Ref<HTMLButtonElement>;
};

/** One of many, chosen from a list. For up to five short choices take a RadioGroup. */
export function Select(props: SelectProps) {
  return (
    <AriaSelect
      className="max-w-full"
      value={props.value === '' ? null : props.value}
      onChange={(key) => props.onChange(key === null ? '' : String(key))}
      onBlur={props.onBlur}
      name={props.name}
      isInvalid={props.error !== undefined}
      isRequired={!props.optional}
      isDisabled={props.disabled}
      placeholder={props.placeholder ?? words.common.choose}
      validationBehavior="aria"
    >
      <FieldLabel label={props.label} hint={props.hint} optional={props.optional} />
      <FieldRow previous={props.previous}>
        <Button
          ref={props.inputRef}
          className="control inline-flex max-w-full items-center justify-between gap-3 text-left"
        >
          <SelectValue className="truncate data-[placeholder]:text-faded" />
          <svg aria-hidden="true" width="10" height="6" viewBox="0 0 10 6" className="shrink-0">
            <path d="M1 1l4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
          </svg>
        </Button>
      </FieldRow>
      <FieldMessage error={props.error} />
      <Popover
        offset={4}
        className="max-h-80 min-w-(--trigger-width) overflow-auto rounded-3 border border-edge bg-panel text-15 text-ink"
      >
        <ListBox className="outline-none">
          {props.choices.map((choice) => (
            <ListBoxItem
              key={choice.value}
              id={choice.value}
              textValue={choice.label}
              className="flex cursor-default items-center px-3 py-1.5 outline-none data-[focused]:bg-kelp/15 data-[selected]:font-semibold"
            >
              <span>{choice.label}</span>
              {choice.note ? <span className="ml-2 text-13 text-faded">{choice.note}</span> : null}
            </ListBoxItem>
          ))}
        </ListBox>
      </Popover>
    </AriaSelect>
  );
}
