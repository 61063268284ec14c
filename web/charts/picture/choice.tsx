/** A line of radio buttons that changes how a picture is drawn. */
import { useId } from 'react';

export function Choice<Value extends string>(props: {
  legend: string;
  value: Value;
  options: readonly { value: Value; text: string }[];
  onChange: (value: Value) => void;
}) {
  const name = useId();
  return (
    <fieldset className="flex flex-wrap items-center gap-x-4">
      <legend className="sr-only">{props.legend}</legend>
      {props.options.map((option) => (
        <label key={option.value} className="target flex min-h-7 items-center gap-2">
          <input
            type="radio"
            name={name}
            value={option.value}
            checked={option.value === props.value}
            onChange={() => props.onChange(option.value)}
            className="size-4 accent-kelp"
          />
          {option.text}
        </label>
      ))}
    </fieldset>
  );
}
