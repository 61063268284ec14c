import { useId, useRef, useState } from 'react';
import { useForm } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import type { z } from 'zod';
import type { importChoicesSchema } from '../../../api/contracts/imports.ts';
import { paths } from '../../app/paths.ts';
import { refusalOf } from '../../app/refusal.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { Select } from '../../components/select.tsx';
import { words } from '../../words/en.ts';
import { useUpload } from './queries.ts';

const text = words.imports;

type Values = { measure: string; file: string };
type UploadFormProps = { study: string; choices: z.infer<typeof importChoicesSchema> };

export function UploadForm({ study, choices }: UploadFormProps) {
  const upload = useUpload(study);
  const navigate = useNavigate();
  const [problem, setProblem] = useState<string>();
  const only = choices.measures.length === 1 ? (choices.measures[0]?.id ?? '') : '';
  const form = useForm<Values>({ defaultValues: { measure: only, file: '' } });
  const [file, setFile] = useState<File | null>(null);

  async function submit({ measure }: Values) {
    setProblem(undefined);
    if (!measure) form.setError('measure', { message: words.form.chooseOne });
    if (!file) form.setError('file', { message: text.fileMissing });
    if (!measure || !file) return;
    try {
      const view = await upload.mutateAsync({ measure, file });
      navigate(paths.import(study, view.id));
    } catch (error) {
      setProblem(refusalOf(error, form));
    }
  }

  return (
    <Form
      form={form}
      onSubmit={submit}
      labels={{ measure: text.measure, file: text.file }}
      problem={problem}
    >
      <Select
        {...useField(form.control, 'measure')}
        label={text.measure}
        hint={text.measureHint}
        choices={choices.measures.map(({ id, label, unit }) => ({
          value: id,
          label,
          note: unit ?? undefined,
        }))}
      />
      <FileField
        file={file}
        error={form.formState.errors.file?.message}
        register={(focus) => form.register('file').ref({ focus, name: 'file' })}
        onChange={(next) => {
          setFile(next);
          form.clearErrors('file');
        }}
      />
      <Button type="submit" weight="filled" isDisabled={upload.isPending}>
        {upload.isPending ? text.uploading : text.upload}
      </Button>
    </Form>
  );
}

type FileFieldProps = {
  file: File | null;
  error?: string;
  /** Lets the list of messages move the focus here. */
  register: (focus: () => void) => void;
  onChange: (file: File | null) => void;
};

function FileField({ file, error, register, onChange }: FileFieldProps) {
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  register(() => input.current?.focus());
  const described = `${id}-hint${error ? ` ${id}-error` : ''}`;
  return (
    <div className="max-w-full">
      <label htmlFor={id} className="block text-15 font-semibold">
        {text.file}
      </label>
      <p id={`${id}-hint`} className="max-w-text text-13 text-faded">
        {text.fileHint}
      </p>
      <input
        ref={input}
        id={id}
        type="file"
        accept=".csv,.txt,.tsv,text/csv,text/plain"
        aria-describedby={described}
        aria-invalid={error !== undefined}
        className="control mt-1 max-w-full"
        onChange={(event) => onChange(event.target.files?.[0] ?? file)}
      />
      {error ? (
        <p id={`${id}-error`} className="mt-1 max-w-text border-l-4 border-stop pl-2 text-stop">
          {error}
        </p>
      ) : null}
    </div>
  );
}
