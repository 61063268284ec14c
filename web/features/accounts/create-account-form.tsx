import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useController, useForm } from 'react-hook-form';
import {
  type CreateAccountRequest,
  createAccountRequestSchema,
  type IssuedAccount,
} from '../../../api/contracts/accounts.ts';
import { refusalOf } from '../../app/refusal.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { RadioGroup } from '../../components/radio-group.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { useCreateAccount } from './queries.ts';

const text = words.accounts;
const labels = { name: text.name, email: text.email, administrator: text.kindLegend };
const EMPTY: CreateAccountRequest = { name: '', email: '', administrator: false };
const KINDS = [
  { value: 'member', label: text.kinds.member, note: text.memberNote },
  { value: 'administrator', label: text.kinds.administrator, note: text.administratorNote },
];

export function CreateAccountForm({ onIssued }: { onIssued: (issued: IssuedAccount) => void }) {
  const create = useCreateAccount();
  const [problem, setProblem] = useState<string>();
  const form = useForm<CreateAccountRequest>({
    resolver: zodResolver(createAccountRequestSchema),
    defaultValues: EMPTY,
  });
  const kind = useController({ control: form.control, name: 'administrator' });

  async function submit(request: CreateAccountRequest) {
    setProblem(undefined);
    try {
      onIssued(await create.mutateAsync(request));
      form.reset(EMPTY);
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form form={form} onSubmit={submit} labels={labels} problem={problem}>
      <TextField
        {...useField(form.control, 'name')}
        label={text.name}
        autoComplete="off"
        width={36}
      />
      <TextField
        {...useField(form.control, 'email')}
        label={text.email}
        type="email"
        autoComplete="off"
        width={36}
      />
      <RadioGroup
        label={text.kindLegend}
        value={kind.field.value ? 'administrator' : 'member'}
        onChange={(value) => kind.field.onChange(value === 'administrator')}
        choices={KINDS}
      />
      <Button type="submit" weight="filled" isDisabled={create.isPending}>
        {text.create}
      </Button>
    </Form>
  );
}
