import { type ReactNode, useEffect, useEffectEvent, useId, useRef, useState } from 'react';
import {
  type Control,
  type FieldErrors,
  type FieldPath,
  type FieldPathValue,
  type FieldValues,
  type UseFormReturn,
  useController,
} from 'react-hook-form';
import { words } from '../words/en.ts';

/**
 * Binds a field of a form to one of our field components:
 * `<TextField {...useField(form.control, 'name')} label=… />`.
 */
export function useField<Values extends FieldValues, Name extends FieldPath<Values>>(
  control: Control<Values>,
  name: Name,
) {
  const { field, fieldState } = useController({ control, name });
  return {
    name: field.name as string,
    value: field.value as FieldPathValue<Values, Name>,
    onChange: field.onChange as (value: FieldPathValue<Values, Name>) => void,
    onBlur: field.onBlur,
    inputRef: field.ref,
    error: fieldState.error?.message,
  };
}

type Message = { path: string; text: string };

function messagesOf(errors: FieldErrors, prefix = ''): Message[] {
  return Object.entries(errors).flatMap(([key, error]) => {
    if (key === 'root' || error === undefined || error === null) return [];
    const path = prefix ? `${prefix}.${key}` : key;
    if (typeof error.message === 'string' && error.message) return [{ path, text: error.message }];
    return messagesOf(error as FieldErrors, path);
  });
}

type FormProps<Values extends FieldValues, Output> = {
  form: UseFormReturn<Values, unknown, Output>;
  onSubmit: (values: Output) => Promise<unknown> | unknown;
  /** The label of each field by its path, so that the summary names what it links to. */
  labels: Readonly<Partial<Record<FieldPath<Values>, string>>>;
  children: ReactNode;
  /** A refusal that belongs to no field. */
  problem?: string;
  className?: string;
};

/**
 * A form in one column. On refusal a list of messages stands on top, each a link to its field,
 * and has the focus; nothing is cleared.
 */
export function Form<Values extends FieldValues, Output>(props: FormProps<Values, Output>) {
  const { form, problem } = props;
  const summary = useRef<HTMLDivElement>(null);
  const headingId = useId();
  const [attempt, setAttempt] = useState(0);
  const { errors } = form.formState;
  const messages = messagesOf(errors);
  const shown = attempt > 0 && (messages.length > 0 || problem !== undefined);

  // Each refused attempt moves the focus; typing into a field afterwards does not.
  const answered = useEffectEvent((tries: number, refusal: string | undefined) => {
    if (tries > 0 && (messages.length > 0 || refusal !== undefined)) summary.current?.focus();
  });
  useEffect(() => answered(attempt, problem), [attempt, problem]);

  return (
    <form
      noValidate
      className={`grid max-w-full grid-cols-[minmax(0,1fr)] justify-items-start gap-4 ${props.className ?? ''}`}
      onSubmit={(event) => {
        void form
          .handleSubmit(props.onSubmit)(event)
          .finally(() => setAttempt((count) => count + 1));
      }}
    >
      {shown ? (
        <div
          ref={summary}
          tabIndex={-1}
          role="alert"
          aria-labelledby={headingId}
          className="w-full max-w-text border-l-4 border-stop py-1 pl-3"
        >
          <h2 id={headingId} className="font-semibold text-stop">
            {problem ?? words.form.summary(messages.length)}
          </h2>
          {messages.length > 0 ? (
            <ul className="mt-1">
              {messages.map(({ path, text }) => (
                <li key={path}>
                  <a
                    href={`#${path}`}
                    className="target inline-flex items-center text-stop"
                    onClick={(event) => {
                      event.preventDefault();
                      focusField(form, path as FieldPath<Values>, event.currentTarget);
                    }}
                  >
                    {labelFor(props.labels, path)}: {text}
                  </a>
                </li>
              ))}
            </ul>
          ) : null}
        </div>
      ) : null}
      {props.children}
    </form>
  );
}

/** Fields of several controls, such as a group of boxes, are found by their name. */
function focusField<Values extends FieldValues, Output>(
  form: UseFormReturn<Values, unknown, Output>,
  path: FieldPath<Values>,
  link: HTMLElement,
): void {
  form.setFocus(path);
  if (document.activeElement !== link) return;
  link
    .closest('form')
    ?.querySelector<HTMLElement>(`[name="${CSS.escape(path)}"]`)
    ?.focus();
}

function labelFor(labels: Readonly<Record<string, string | undefined>>, path: string): string {
  return labels[path] ?? labels[path.split('.')[0] ?? ''] ?? path;
}
