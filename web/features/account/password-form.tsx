import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import {
  type ChangePasswordRequest,
  changePasswordRequestSchema,
} from '../../../api/contracts/auth.ts';
import { refusalOf } from '../../app/refusal.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { changePassword } from './queries.ts';

const text = words.account;
const labels = { currentPassword: text.currentPassword, newPassword: text.newPassword };
const EMPTY = { currentPassword: '', newPassword: '' };

export function PasswordForm({ onChanged }: { onChanged: () => void }) {
  const [problem, setProblem] = useState<string>();
  const form = useForm<ChangePasswordRequest>({
    resolver: zodResolver(changePasswordRequestSchema),
    defaultValues: EMPTY,
  });

  async function change(request: ChangePasswordRequest) {
    setProblem(undefined);
    try {
      await changePassword(request);
      form.reset(EMPTY);
      onChanged();
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form form={form} onSubmit={change} labels={labels} problem={problem}>
      <TextField
        {...useField(form.control, 'currentPassword')}
        label={text.currentPassword}
        type="password"
        autoComplete="current-password"
        width={36}
      />
      <TextField
        {...useField(form.control, 'newPassword')}
        label={text.newPassword}
        hint={text.newPasswordHint}
        type="password"
        autoComplete="new-password"
        width={36}
      />
      <Button type="submit" weight="filled" isDisabled={form.formState.isSubmitting}>
        {text.changePassword}
      </Button>
    </Form>
  );
}
