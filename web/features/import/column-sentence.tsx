import { type Control, useWatch } from 'react-hook-form';
import type { ImportView } from '../../../api/contracts/imports.ts';
import { useField } from '../../components/form.tsx';
import { Select } from '../../components/select.tsx';
import { words } from '../../words/en.ts';
import { type MappingValues, type Meaning, meanings } from './mapping-values.ts';

const text = words.imports;
const WHEN: ReadonlySet<Meaning> = new Set(['date', 'days', 'visit']);

type ColumnSentenceProps = {
  control: Control<MappingValues>;
  index: number;
  column: { name: string; samples: readonly string[] };
  measure: ImportView['measure'];
  per: 'visit' | 'subject';
};

/** "Column `wt` holds [body weight in kg], values like 71.2, 80.4, 66.0". */
export function ColumnSentence({ control, index, column, measure, per }: ColumnSentenceProps) {
  const meaning = useField(control, `columns.${index}.meaning`);
  const order = useField(control, `columns.${index}.order`);
  const chosen = useWatch({ control, name: `columns.${index}.meaning` });
  const offered = meanings.filter((each) => per === 'visit' || !WHEN.has(each));
  return (
    <li className="flex flex-wrap items-end gap-x-4 gap-y-2 border-b border-line py-3">
      <Select
        {...meaning}
        onChange={(value) => meaning.onChange(value as Meaning)}
        label={`${text.column(column.name)} ${text.holds}`}
        choices={offered.map((value) => ({
          value,
          label:
            value === 'value'
              ? text.meanings.value(measure.label, measure.unit)
              : text.meanings[value],
        }))}
      />
      {chosen === 'date' ? (
        <Select
          {...order}
          onChange={(value) => order.onChange(value as MappingValues['columns'][number]['order'])}
          label={text.order}
          choices={Object.entries(text.orders).map(([value, label]) => ({ value, label }))}
        />
      ) : null}
      <span className="min-w-0 pb-2 break-words text-faded">{text.valuesLike(column.samples)}</span>
    </li>
  );
}
