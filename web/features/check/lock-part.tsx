/** The lock on the ordinary straight line: last on the page, closed until somebody opens it. */
import { zodResolver } from '@hookform/resolvers/zod';
import { useId, useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { acknowledgeRequestSchema } from '../../../api/contracts/analysis.ts';
import { paths } from '../../app/paths.ts';
import { refusalOf } from '../../app/refusal.ts';
import { useStudy } from '../../app/session.ts';
import { type Question, questionQuery } from '../../app/specification-address.ts';
import { Button, ButtonLink } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { Moment } from '../../components/moment.tsx';
import { TextAreaField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import type { PartProps } from './part-props.ts';
import { useAcknowledge } from './queries.ts';

const text = words.check;

export function LockPart({ check, question }: PartProps) {
  const { lock, structure } = check;
  return (
    <section aria-label={text.lockHeading} className="mt-12 border-t border-line pt-5">
      {lock.locked ? (
        <Locked readings={structure.readings} question={question} />
      ) : (
        <Open check={check} question={question} />
      )}
    </section>
  );
}

function Open({ check, question }: Pick<PartProps, 'check' | 'question'>) {
  const { study } = useStudy();
  const { acknowledgement } = check.lock;
  return (
    <>
      {acknowledgement ? (
        <>
          <p>
            <strong className="text-flare-ink">{text.unlocked}</strong>{' '}
            {text.unlockedBy(acknowledgement.by)}
            <Moment at={acknowledgement.at} />
          </p>
          <p className="max-w-text text-faded">{text.unlockedReason(acknowledgement.reason)}</p>
        </>
      ) : (
        <p>{text.freely}</p>
      )}
      <ButtonLink
        className="mt-3"
        to={`${paths.fit(study.id)}?${questionQuery(question)}&fit=ordinary`}
      >
        {text.fitOrdinary}
      </ButtonLink>
    </>
  );
}

function Locked({ readings, question }: { readings: number; question: Question }) {
  const [asking, setAsking] = useState(false);
  const form = useId();
  return (
    <>
      <p>
        <strong className="text-flare-ink">{text.locked}</strong> {text.lockWhy(readings)}{' '}
        <Button
          weight="quiet"
          aria-expanded={asking}
          aria-controls={asking ? form : undefined}
          onPress={() => setAsking(!asking)}
        >
          {asking ? text.lockClose : text.lockOpen}
        </Button>
      </p>
      {asking ? (
        <div id={form} className="mt-4">
          <ReasonForm question={question} />
        </div>
      ) : null}
    </>
  );
}

const schema = acknowledgeRequestSchema.pick({ reason: true });

function ReasonForm({ question }: { question: Question }) {
  const { study } = useStudy();
  const acknowledge = useAcknowledge(study.id, question);
  const [problem, setProblem] = useState<string>();
  const form = useForm<z.infer<typeof schema>>({
    resolver: zodResolver(schema),
    defaultValues: { reason: '' },
  });
  const { inputRef: _, ...field } = useField(form.control, 'reason');

  async function submit({ reason }: z.infer<typeof schema>) {
    setProblem(undefined);
    try {
      await acknowledge.mutateAsync(reason);
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form form={form} onSubmit={submit} labels={{ reason: text.lockReason }} problem={problem}>
      <div className="w-full max-w-text">
        <TextAreaField
          {...field}
          label={text.lockReason}
          hint={text.lockReasonHint}
          reading={text.lockCount(field.value.trim().length)}
        />
      </div>
      <Button type="submit" isDisabled={acknowledge.isPending}>
        {text.lockAct}
      </Button>
    </Form>
  );
}
