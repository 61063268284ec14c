import type { ReactNode } from 'react';
import {
  Checkbox as AriaCheckbox,
  CheckboxGroup as AriaCheckboxGroup,
} from 'react-aria-components';
import { FieldLabel, FieldMessage, type FieldWords } from './field.tsx';
import type { Choice } from './select.tsx';

function Box() {
  return (
    <span
      aria-hidden="true"
      className="flex size-4 shrink-0 items-center justify-center rounded-[2px] border border-edge bg-panel text-surface outline-offset-2 group-data-[focus-visible]:outline-2 group-data-[invalid]:border-stop group-data-[selected]:border-kelp group-data-[selected]:bg-kelp group-data-[focus-visible]:outline-ink"
    >
      <svg
        aria-hidden="true"
        viewBox="0 0 12 12"
        className="hidden size-3 group-data-[selected]:block"
      >
        <path d="M2 6.5l2.5 2.5L10 3" fill="none" stroke="currentColor" strokeWidth="2" />
      </svg>
    </span>
  );
}

const ROW = 'target group flex min-h-8 cursor-pointer items-center gap-2 outline-none';

type CheckboxProps = {
  checked: boolean;
  onChange: (checked: boolean) => void;
  onBlur?: () => void;
  name?: string;
  disabled?: boolean;
  children: ReactNode;
};

export function Checkbox(props: CheckboxProps) {
  return (
    <AriaCheckbox
      className={ROW}
      isSelected={props.checked}
      onChange={props.onChange}
      onBlur={props.onBlur}
      name={props.name}
      isDisabled={props.disabled}
    >
      <Box />
      <span>{props.children}</span>
    </AriaCheckbox>
  );
}

type CheckboxGroupProps = FieldWords & {
  values: readonly string[];
  onChange: (values: string[]) => void;
  onBlur?: () => void;
  choices: readonly Choice[];
  name?: string;
  inputRef?: React.Ref<HTMLDivElement>;
};

export function CheckboxGroup(props: CheckboxGroupProps) {
  return (
    <AriaCheckboxGroup
      ref={props.inputRef}
      value={[...props.values]}
      onChange={props.onChange}
      onBlur={props.onBlur}
      name={props.name}
      isInvalid={props.error !== undefined}
      isRequired={!props.optional}
      validationBehavior="aria"
    >
      <FieldLabel label={props.label} hint={props.hint} optional={props.optional} />
      <div className="mt-1">
        {props.choices.map((choice) => (
          <AriaCheckbox key={choice.value} value={choice.value} className={ROW}>
            <Box />
            <span>
              {choice.label}
              {choice.note ? <span className="ml-2 text-13 text-faded">{choice.note}</span> : null}
            </span>
          </AriaCheckbox>
        ))}
      </div>
      <FieldMessage error={props.error} />
    </AriaCheckboxGroup>
  );
}
