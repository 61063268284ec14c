import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { useController, useFieldArray, useForm } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import type { CutChoices } from '../../../api/contracts/cuts.ts';
import { newIdempotencyKey } from '../../app/api.ts';
import { paths } from '../../app/paths.ts';
import { refusalOf } from '../../app/refusal.ts';
import { Button } from '../../components/button.tsx';
import { CheckboxGroup } from '../../components/checkbox.tsx';
import { DateField } from '../../components/date-field.tsx';
import { Form, useField } from '../../components/form.tsx';
import { notify } from '../../components/notices.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { TextAreaField, TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { ExclusionFields } from './exclusion-fields.tsx';
import { type FreezeValues, freezeFormSchema } from './freeze-values.ts';
import { Preview } from './preview.tsx';
import { cutPreviewQueryOptions, useFreezeCut } from './queries.ts';

const text = words.cuts;
const labels = {
  name: text.name,
  visitCutoff: text.visitCutoff,
  measures: text.measures,
  exclusions: text.exclusions,
  includeReason: text.includeReason,
};

export function FreezeForm({ study, choices }: { study: string; choices: CutChoices }) {
  const navigate = useNavigate();
  const freeze = useFreezeCut(study);
  const [problem, setProblem] = useState<string>();
  // One key for one intended cut: a try after a lost answer must not freeze it twice.
  const key = useRef({ of: '', key: '' });
  const form = useForm<FreezeValues>({
    resolver: zodResolver(freezeFormSchema),
    defaultValues: {
      name: '',
      visitCutoff: choices.today,
      measures: choices.measures.map(({ shortName }) => shortName),
      exclusions: [],
      withdrawn: 'leave out',
      includeReason: '',
    },
  });
  const measures = useController({ control: form.control, name: 'measures' });
  const exclusions = useFieldArray({ control: form.control, name: 'exclusions' });
  const [visitCutoff, chosen, withdrawn] = form.watch(['visitCutoff', 'measures', 'withdrawn']);
  const preview = useQuery(cutPreviewQueryOptions(study, { visitCutoff, measures: chosen }));
  const asksWithdrawn = (preview.data?.withdrawnReadings ?? 0) > 0;

  async function submit(values: FreezeValues) {
    setProblem(undefined);
    const body = {
      name: values.name,
      visitCutoff: values.visitCutoff,
      measures: values.measures,
      exclusions: values.exclusions.map((each) => ({
        ...each,
        measure: each.measure || null,
        visit: each.visit.trim() || null,
      })),
      includeWithdrawnReason:
        asksWithdrawn && values.withdrawn === 'include' ? values.includeReason : null,
    };
    const of = JSON.stringify(body);
    if (key.current.of !== of) key.current = { of, key: newIdempotencyKey() };
    try {
      const cut = await freeze.mutateAsync({ body, key: key.current.key });
      notify(text.frozen(cut.number));
      await navigate(paths.cut(study, cut.id));
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <div className="grid gap-10 wide:grid-cols-[minmax(0,1fr)_380px]">
      <Form form={form} onSubmit={submit} labels={labels} problem={problem}>
        <TextField
          {...useField(form.control, 'name')}
          label={text.name}
          hint={text.nameHint}
          autoComplete="off"
          width={40}
        />
        <DateField
          {...useField(form.control, 'visitCutoff')}
          label={text.visitCutoff}
          hint={text.visitCutoffHint}
        />
        <CheckboxGroup
          label={text.measures}
          values={measures.field.value}
          onChange={measures.field.onChange}
          onBlur={measures.field.onBlur}
          inputRef={measures.field.ref}
          error={measures.fieldState.error?.message}
          choices={choices.measures.map((measure) => ({
            value: measure.shortName,
            label: measure.label,
            note: [measure.unit, measure.per === 'subject' ? text.oncePerSubject : null]
              .filter(Boolean)
              .join(', '),
          }))}
        />
        {asksWithdrawn && preview.data ? (
          <>
            <RadioGroup
              label={text.withdrawn}
              hint={text.withdrawnHint(
                preview.data.withdrawnReadings,
                preview.data.withdrawnSubjects,
              )}
              value={withdrawn}
              onChange={(value) =>
                form.setValue('withdrawn', value === 'include' ? 'include' : 'leave out')
              }
              choices={[
                { value: 'leave out', label: text.leaveOut },
                { value: 'include', label: text.include },
              ]}
            />
            {withdrawn === 'include' ? <IncludeReason control={form.control} /> : null}
          </>
        ) : null}
        <ExclusionFields
          control={form.control}
          fields={exclusions.fields}
          measures={choices.measures}
          onAdd={() => exclusions.append({ subjectCode: '', measure: '', visit: '', reason: '' })}
          onRemove={exclusions.remove}
        />
        <Button type="submit" weight="filled" isDisabled={freeze.isPending}>
          {freeze.isPending ? text.freezing : text.freeze}
        </Button>
      </Form>
      <Preview query={preview} asked={visitCutoff !== '' && chosen.length > 0} />
    </div>
  );
}

function IncludeReason({
  control,
}: {
  control: ReturnType<typeof useForm<FreezeValues>>['control'];
}) {
  const { inputRef: _, ...field } = useField(control, 'includeReason');
  return (
    <TextAreaField {...field} label={text.includeReason} hint={text.includeReasonHint} rows={2} />
  );
}
