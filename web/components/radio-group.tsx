import { RadioGroup as AriaRadioGroup, Radio, Text } from 'react-aria-components';
import { FieldLabel, FieldMessage, type FieldWords } from './field.tsx';
import type { Choice } from './select.tsx';

type RadioGroupProps = FieldWords & {
  /** The empty text while nothing is chosen. */
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  choices: readonly Choice[];
  name?: string;
  /** Side by side, for ways to look at one thing. */
  inline?: boolean;
  disabled?: boolean;
  /** The label is said, not shown, where the picture beside it shows what is chosen. */
  hideLabel?: boolean;
  inputRef?: React.Ref<HTMLDivElement>;
};

export function RadioGroup(props: RadioGroupProps) {
  return (
    <AriaRadioGroup
      ref={props.inputRef}
      value={props.value === '' ? null : props.value}
      onChange={props.onChange}
      onBlur={props.onBlur}
      name={props.name}
      isInvalid={props.error !== undefined}
      isRequired={!props.optional && !props.hideLabel}
      isDisabled={props.disabled}
      aria-label={props.hideLabel ? props.label : undefined}
      validationBehavior="aria"
    >
      {props.hideLabel ? null : (
        <FieldLabel label={props.label} hint={props.hint} optional={props.optional} />
      )}
      <div className={props.inline ? 'mt-1 flex flex-wrap gap-x-6' : 'mt-1'}>
        {props.choices.map((choice) => (
          <Radio
            key={choice.value}
            value={choice.value}
            className="target group flex min-h-8 cursor-pointer items-center gap-2 outline-none"
          >
            <span
              aria-hidden="true"
              className="flex size-4 shrink-0 items-center justify-center rounded-full border border-edge bg-panel outline-offset-2 group-data-[focus-visible]:outline-2 group-data-[invalid]:border-stop group-data-[selected]:border-kelp group-data-[focus-visible]:outline-ink"
            >
              <span className="size-2 rounded-full group-data-[selected]:bg-kelp" />
            </span>
            <span>
              {choice.label}
              {choice.note ? (
                <Text slot="description" className="block max-w-text text-13 text-faded">
                  {choice.note}
                </Text>
              ) : null}
            </span>
          </Radio>
        ))}
      </div>
      <FieldMessage error={props.error} />
    </AriaRadioGroup>
  );
}
