import type { HTMLInputAutoCompleteAttribute, ReactNode, Ref } from 'react';
import { TextField as AriaTextField, Input, TextArea } from 'react-aria-components';
import { FieldLabel, FieldMessage, FieldRow, type FieldWords } from './field.tsx';

type TextFieldProps = FieldWords & {
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  name?: string;
  id?: string;
  type?: 'text' | 'email' | 'password' | 'search' | 'date';
  inputMode?: 'text' | 'decimal' | 'numeric' | 'email';
  autoComplete?: HTMLInputAutoCompleteAttribute;
  /** Width in characters of what is typed into it. */
  width?: number;
  /** Stands inside the right edge. */
  unit?: string;
  /** Said at the right of the field, in faded type: a date in words, a count of characters. */
  reading?: ReactNode;
  mono?: boolean;
  disabled?: boolean;
  maxLength?: number;
  inputRef?: Ref<HTMLInputElement>;
};

export function TextField(props: TextFieldProps) {
  const { value, onChange, onBlur, name, id, type = 'text', unit, width = 32, error } = props;
  return (
    <AriaTextField
      className="max-w-full"
      value={value}
      onChange={onChange}
      onBlur={onBlur}
      name={name}
      id={id}
      autoComplete={props.autoComplete}
      isInvalid={error !== undefined}
      isRequired={!props.optional}
      isDisabled={props.disabled}
      maxLength={props.maxLength}
      validationBehavior="aria"
    >
      <FieldLabel label={props.label} hint={props.hint} optional={props.optional} />
      <FieldRow previous={props.previous}>
        <span
          className="relative inline-block max-w-full"
          style={{ width: `calc(${width}ch + 24px${unit ? ` + ${unit.length + 1}ch` : ''})` }}
        >
          <Input
            ref={props.inputRef}
            type={type}
            inputMode={props.inputMode}
            className={`control w-full ${props.mono ? 'figure' : ''}`}
            style={unit ? { paddingRight: `calc(${unit.length}ch + 16px)` } : undefined}
          />
          {unit ? (
            <span
              aria-hidden="true"
              className="pointer-events-none absolute inset-y-0 right-2 flex items-center text-13 text-faded"
            >
              {unit}
            </span>
          ) : null}
        </span>
        {props.reading ? <span className="text-13 text-faded">{props.reading}</span> : null}
      </FieldRow>
      <FieldMessage error={error} />
    </AriaTextField>
  );
}

type TextAreaFieldProps = FieldWords & {
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  name?: string;
  rows?: number;
  reading?: ReactNode;
  disabled?: boolean;
  inputRef?: Ref<HTMLTextAreaElement>;
};

/** Several lines of text: a reason, an explanation. */
export function TextAreaField(props: TextAreaFieldProps) {
  return (
    <AriaTextField
      className="max-w-full"
      value={props.value}
      onChange={props.onChange}
      onBlur={props.onBlur}
      name={props.name}
      isInvalid={props.error !== undefined}
      isRequired={!props.optional}
      isDisabled={props.disabled}
      validationBehavior="aria"
    >
      <FieldLabel label={props.label} hint={props.hint} optional={props.optional} />
      <TextArea
        ref={props.inputRef}
        rows={props.rows ?? 3}
        className="control mt-1 block w-full max-w-text"
      />
      {props.reading ? <span className="block text-13 text-faded">{props.reading}</span> : null}
      <FieldMessage error={props.error} />
    </AriaTextField>
  );
}
