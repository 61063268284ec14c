import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import type { ImportView, importChoicesSchema } from '../../../api/contracts/imports.ts';
import { sentenceOf } from '../../app/problem.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { Section } from '../../components/page.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { words } from '../../words/en.ts';
import { ColumnSentence } from './column-sentence.tsx';
import { type MappingValues, readMapping, startValues } from './mapping-values.ts';
import { NewSubjectFields } from './new-subject-fields.tsx';
import { useCheckImport } from './queries.ts';

const text = words.imports;

type MappingFormProps = {
  study: string;
  view: ImportView;
  choices: z.infer<typeof importChoicesSchema>;
};

export function MappingForm({ study, view, choices }: MappingFormProps) {
  const check = useCheckImport(study);
  const [problem, setProblem] = useState<string>();
  const form = useForm<MappingValues>({ defaultValues: startValues(view, choices.sites) });
  const { control } = form;
  const columns = useWatch({ control, name: 'columns' });
  const enrol = useWatch({ control, name: 'enrol' });
  const measure = choices.measures.find(({ id }) => id === view.measure.id);
  const per = measure?.per ?? 'visit';

  async function submit(values: MappingValues) {
    setProblem(undefined);
    const { mapping, faults } = readMapping(values, per);
    if (!mapping) {
      for (const { path, message } of faults) form.setError(path, { type: 'needs', message });
      return;
    }
    try {
      await check.mutateAsync({ view, mapping });
    } catch (error) {
      setProblem(sentenceOf(error));
    }
  }

  const labels = Object.fromEntries([
    ...columns.map(({ name }, index) => [`columns.${index}.meaning`, text.column(name)]),
    ...columns.map(({ name }, index) => [`columns.${index}.order`, text.column(name)]),
    ['facts.site.value', text.newSite],
    ['facts.site.column', text.newSite],
    ['facts.consentVersion.value', text.newConsentVersion],
    ['facts.consentVersion.column', text.newConsentVersion],
    ['facts.consentDate.value', text.newConsentDate],
    ['facts.consentDate.column', text.newConsentDate],
    ['facts.baselineDate.value', text.newBaselineDate],
    ['facts.baselineDate.column', text.newBaselineDate],
    ['factOrder', text.newOrder],
  ]);

  return (
    <Section heading={text.mappingHeading} sentence={text.mappingSentence}>
      <Form form={form} onSubmit={submit} labels={labels} problem={problem}>
        <ul className="w-full border-t border-line">
          {view.columns.map((column, index) => (
            <ColumnSentence
              key={column.name}
              control={control}
              index={index}
              column={column}
              measure={view.measure}
              per={per}
            />
          ))}
        </ul>
        <RadioGroup
          {...useField(control, 'decimal')}
          onChange={(mark) => form.setValue('decimal', mark === ',' ? ',' : '.')}
          label={text.decimal}
          inline
          choices={[
            { value: '.', label: text.decimals['.'] },
            { value: ',', label: text.decimals[','] },
          ]}
        />
        <RadioGroup
          {...useField(control, 'enrol')}
          onChange={(choice) => form.setValue('enrol', choice === 'enrol' ? 'enrol' : 'refuse')}
          label={text.newChoice}
          choices={[
            { value: 'refuse', label: text.newRefuse },
            { value: 'enrol', label: text.newEnrol, note: text.newEnrolNote },
          ]}
        />
        {enrol === 'enrol' ? (
          <NewSubjectFields control={control} columns={view.columns} sites={choices.sites} />
        ) : null}
        <Button
          type="submit"
          weight={view.state === 'checked' ? 'outlined' : 'filled'}
          isDisabled={check.isPending}
        >
          {view.counts ? text.checkAgain : text.check}
        </Button>
      </Form>
    </Section>
  );
}
