import { type Control, useWatch } from 'react-hook-form';
import { DateField } from '../../components/date-field.tsx';
import { useField } from '../../components/form.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { Select } from '../../components/select.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import type { MappingValues, NewFact } from './mapping-values.ts';

const text = words.imports;
const LABELS: Readonly<Record<NewFact, string>> = {
  site: text.newSite,
  consentVersion: text.newConsentVersion,
  consentDate: text.newConsentDate,
  baselineDate: text.newBaselineDate,
};

type NewSubjectFieldsProps = {
  control: Control<MappingValues>;
  columns: readonly { name: string }[];
  sites: readonly { code: string; name: string }[];
};

/** What a new subject needs, once for all or from a column. */
export function NewSubjectFields({ control, columns, sites }: NewSubjectFieldsProps) {
  const order = useField(control, 'factOrder');
  const facts = useWatch({ control, name: 'facts' });
  const datesInColumns =
    facts.consentDate.from === 'column' || facts.baselineDate.from === 'column';
  return (
    <fieldset className="grid gap-4 border-l-2 border-line pl-4">
      <legend className="mb-2 text-15 font-semibold">{text.newHeading}</legend>
      {(['site', 'consentVersion', 'consentDate', 'baselineDate'] as const).map((fact) => (
        <FactField key={fact} control={control} fact={fact} columns={columns} sites={sites} />
      ))}
      {datesInColumns ? (
        <Select
          {...order}
          onChange={(value) => order.onChange(value as MappingValues['factOrder'])}
          label={text.newOrder}
          hint={text.orderHint}
          choices={Object.entries(text.orders).map(([value, label]) => ({ value, label }))}
        />
      ) : null}
    </fieldset>
  );
}

function FactField({ control, fact, columns, sites }: NewSubjectFieldsProps & { fact: NewFact }) {
  const from = useField(control, `facts.${fact}.from`);
  const value = useField(control, `facts.${fact}.value`);
  const column = useField(control, `facts.${fact}.column`);
  const label = LABELS[fact];
  return (
    <div className="flex flex-wrap items-end gap-x-6 gap-y-2">
      <RadioGroup
        {...from}
        onChange={(choice) => from.onChange(choice === 'column' ? 'column' : 'fixed')}
        label={text.sourceOf(label)}
        inline
        choices={[
          { value: 'fixed', label: text.sameForAll },
          { value: 'column', label: text.fromColumn },
        ]}
      />
      {from.value === 'column' ? (
        <Select
          {...column}
          label={text.columnOf(label)}
          choices={columns.map(({ name }) => ({ value: name, label: name }))}
        />
      ) : fact === 'site' ? (
        <Select
          {...value}
          label={label}
          choices={sites.map(({ code, name }) => ({ value: code, label: name, note: code }))}
        />
      ) : fact === 'consentVersion' ? (
        <TextField {...value} label={label} width={12} maxLength={32} autoComplete="off" />
      ) : (
        <DateField {...value} label={label} />
      )}
    </div>
  );
}
