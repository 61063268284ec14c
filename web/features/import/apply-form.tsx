import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { ImportCounts, ImportView } from '../../../api/contracts/imports.ts';
import { sentenceOf } from '../../app/problem.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { Section } from '../../components/page.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { TextAreaField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { useApplyImport } from './queries.ts';

const text = words.imports;
type Values = { keep: '' | 'keep' | 'leave'; explanation: string };
type ApplyFormProps = { study: string; view: ImportView; counts: ImportCounts };

/** Nothing is preselected about values outside the plausible range: a person decides. */
export function ApplyForm({ study, view, counts }: ApplyFormProps) {
  const apply = useApplyImport(study);
  const [problem, setProblem] = useState<string>();
  const form = useForm<Values>({ defaultValues: { keep: '', explanation: '' } });
  const keepField = useField(form.control, 'keep');
  const explanation = useField(form.control, 'explanation');
  const keep = useWatch({ control: form.control, name: 'keep' });
  const asked = counts.implausible > 0;
  const written = counts.fresh - (asked && keep !== 'keep' ? counts.implausible : 0);

  async function submit(values: Values) {
    setProblem(undefined);
    if (asked && values.keep === '') {
      form.setError('keep', { message: text.chooseKeep });
      return;
    }
    if (values.keep === 'keep' && values.explanation.trim() === '') {
      form.setError('explanation', { message: text.explanationMissing });
      return;
    }
    try {
      await apply.mutateAsync({
        view,
        keepImplausible: values.keep === 'keep',
        explanation: values.keep === 'keep' ? values.explanation.trim() : null,
      });
    } catch (error) {
      setProblem(sentenceOf(error));
    }
  }

  return (
    <Section heading={text.applyHeading}>
      <Form
        form={form}
        onSubmit={submit}
        labels={{ keep: text.keepChoice, explanation: text.explanation }}
        problem={problem}
      >
        {asked ? (
          <RadioGroup
            {...keepField}
            onChange={(choice) => keepField.onChange(choice === 'keep' ? 'keep' : 'leave')}
            label={text.keepChoice}
            hint={text.outcome.implausible(counts.implausible)}
            choices={[
              { value: 'leave', label: text.leaveOut },
              { value: 'keep', label: text.keep },
            ]}
          />
        ) : null}
        {keep === 'keep' ? (
          <TextAreaField {...explanation} label={text.explanation} hint={text.explanationHint} />
        ) : null}
        <Button type="submit" weight="filled" isDisabled={apply.isPending}>
          {text.apply(written)}
        </Button>
      </Form>
    </Section>
  );
}
