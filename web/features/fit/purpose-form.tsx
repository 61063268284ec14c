import { zodResolver } from '@hookform/resolvers/zod';
import { useRef, useState } from 'react';
import { useController, useForm } from 'react-hook-form';
import { Link, useNavigate } from 'react-router-dom';
import { z } from 'zod';
import { purposes } from '../../../api/contracts/analysis.ts';
import { newIdempotencyKey } from '../../app/api.ts';
import { paths } from '../../app/paths.ts';
import { refusalOf } from '../../app/refusal.ts';
import { useStudy } from '../../app/session.ts';
import { type Question, questionQuery } from '../../app/specification-address.ts';
import { Button } from '../../components/button.tsx';
import { Form } from '../../components/form.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { words } from '../../words/en.ts';
import { useRunFit } from './queries.ts';

const text = words.fit;
type Purpose = (typeof purposes)[number];
/** Nothing is chosen at first. */
type Values = { purpose: Purpose | '' };
const schema: z.ZodType<{ purpose: Purpose }, Values> = z.object({
  purpose: z
    .union([z.enum(purposes), z.literal('')])
    .refine((purpose) => purpose !== '', text.choose)
    .transform((purpose) => purpose as Purpose),
});

export function PurposeForm({ question, fit }: { question: Question; fit: 'pooled' | 'ordinary' }) {
  const { study } = useStudy();
  const navigate = useNavigate();
  const run = useRunFit(study.id, question.cut);
  const [problem, setProblem] = useState<string>();
  // One key for one intended run: a try after a lost answer writes no second record.
  const key = useRef({ purpose: '', key: '' });
  const form = useForm<Values, unknown, { purpose: Purpose }>({
    resolver: zodResolver(schema),
    defaultValues: { purpose: '' },
  });
  const purpose = useController({ control: form.control, name: 'purpose' });

  async function submit(values: { purpose: Purpose }) {
    setProblem(undefined);
    if (key.current.purpose !== values.purpose)
      key.current = { purpose: values.purpose, key: newIdempotencyKey() };
    try {
      const record = await run.mutateAsync({
        body: { specification: question.specification, fit, purpose: values.purpose },
        key: key.current.key,
      });
      await navigate(paths.record(study.id, record.id), { replace: true });
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form form={form} onSubmit={submit} labels={{ purpose: text.purpose }} problem={problem}>
      <RadioGroup
        label={text.purpose}
        hint={fit === 'ordinary' ? `${text.kept} ${text.stampSays}` : text.kept}
        value={purpose.field.value}
        onChange={purpose.field.onChange}
        onBlur={purpose.field.onBlur}
        inputRef={purpose.field.ref}
        error={purpose.fieldState.error?.message}
        choices={[
          { value: 'planned', label: text.planned, note: text.plannedNote },
          { value: 'exploratory', label: text.exploratory, note: text.exploratoryNote },
        ]}
      />
      <div className="flex flex-wrap items-center gap-6">
        <Button type="submit" weight="filled" isDisabled={run.isPending}>
          {text.run}
        </Button>
        <Link to={`${paths.check(study.id)}?${questionQuery(question)}`}>
          {text.backToCheckFrom}
        </Link>
        <span role="status" className="text-faded">
          {run.isPending ? text.running : null}
        </span>
      </div>
    </Form>
  );
}
