import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { type AddMemberRequest, addMemberRequestSchema } from '../../../api/contracts/members.ts';
import { refusalOf } from '../../app/refusal.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { notify } from '../../components/notices.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';
import { DutiesFields } from './duties-fields.tsx';
import { useAddMember } from './queries.ts';

const text = words.members;
const labels = { email: text.email, roles: text.roles, siteIds: text.sites, chair: text.chair };
const EMPTY: AddMemberRequest = { email: '', roles: [], chair: false, siteIds: [] };
const schema = addMemberRequestSchema.refine(
  ({ roles, siteIds }) => !roles.includes('coordinator') || siteIds.length > 0,
  { path: ['siteIds'], message: text.needsSite },
);

type AddMemberFormProps = {
  study: string;
  sites: readonly { id: string; code: string; name: string }[];
};

export function AddMemberForm({ study, sites }: AddMemberFormProps) {
  const add = useAddMember(study);
  const [problem, setProblem] = useState<string>();
  const form = useForm<AddMemberRequest>({ resolver: zodResolver(schema), defaultValues: EMPTY });
  const duties = form.watch(['roles', 'chair', 'siteIds']);
  const { errors } = form.formState;

  async function submit(request: AddMemberRequest) {
    setProblem(undefined);
    try {
      await add.mutateAsync(request);
      form.reset(EMPTY);
      notify(text.added(request.email));
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form form={form} onSubmit={submit} labels={labels} problem={problem}>
      <TextField
        {...useField(form.control, 'email')}
        label={text.email}
        hint={text.emailHint}
        type="email"
        autoComplete="off"
        width={36}
      />
      <DutiesFields
        sites={sites}
        value={{ roles: duties[0], chair: duties[1], siteIds: duties[2] }}
        errors={{ roles: errors.roles?.message, siteIds: errors.siteIds?.message }}
        onChange={(next) => {
          form.setValue('roles', next.roles);
          form.setValue('chair', next.chair);
          form.setValue('siteIds', next.siteIds);
          form.clearErrors(['roles', 'siteIds']);
        }}
      />
      <Button type="submit" weight="filled" isDisabled={add.isPending}>
        {text.add}
      </Button>
    </Form>
  );
}
