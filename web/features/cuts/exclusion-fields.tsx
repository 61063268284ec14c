import type { Control } from 'react-hook-form';
import type { CutMeasure } from '../../../api/contracts/cuts.ts';
import { Button } from '../../components/button.tsx';
import { useField } from '../../components/form.tsx';
import { Select } from '../../components/select.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import type { FreezeValues } from './freeze-values.ts';

const text = words.cuts;
/** A choice needs a value; in the request it becomes null. */
const ALL = '';

type Props = {
  control: Control<FreezeValues>;
  fields: readonly { id: string }[];
  measures: readonly CutMeasure[];
  onAdd: () => void;
  onRemove: (index: number) => void;
};

export function ExclusionFields({ control, fields, measures, onAdd, onRemove }: Props) {
  return (
    <fieldset className="w-full">
      <legend className="text-15 font-semibold">{text.exclusions}</legend>
      <p className="max-w-text text-13 text-faded">{text.exclusionsHint}</p>
      <ol className="mt-2 grid gap-4">
        {fields.map((field, index) => (
          <li key={field.id} className="border-l border-line pl-4">
            <Exclusion
              control={control}
              index={index}
              measures={measures}
              onRemove={() => onRemove(index)}
            />
          </li>
        ))}
      </ol>
      <Button className="mt-3" onPress={onAdd}>
        {text.addExclusion}
      </Button>
    </fieldset>
  );
}

function Exclusion(props: {
  control: Control<FreezeValues>;
  index: number;
  measures: readonly CutMeasure[];
  onRemove: () => void;
}) {
  const { control, index, measures } = props;
  const measure = useField(control, `exclusions.${index}.measure`);
  return (
    <fieldset className="grid justify-items-start gap-3">
      <legend className="text-13 font-semibold text-faded">{text.exclusion(index + 1)}</legend>
      <div className="flex flex-wrap items-end gap-4">
        <TextField
          {...useField(control, `exclusions.${index}.subjectCode`)}
          label={text.subjectCode}
          autoComplete="off"
          mono
          width={14}
        />
        <Select
          name={measure.name}
          value={measure.value === ALL ? 'all' : measure.value}
          onChange={(value) => measure.onChange(value === 'all' ? ALL : value)}
          onBlur={measure.onBlur}
          error={measure.error}
          label={text.excludedMeasure}
          choices={[
            { value: 'all', label: text.wholeSubject },
            ...measures.map(({ shortName, label }) => ({ value: shortName, label })),
          ]}
        />
        <TextField
          {...useField(control, `exclusions.${index}.visit`)}
          label={text.excludedVisit}
          hint={text.everyVisit}
          optional
          autoComplete="off"
          width={18}
        />
      </div>
      <TextField
        {...useField(control, `exclusions.${index}.reason`)}
        label={text.reason}
        autoComplete="off"
        width={52}
      />
      <Button weight="quiet" onPress={props.onRemove}>
        {text.removeExclusion(index + 1)}
      </Button>
    </fieldset>
  );
}
