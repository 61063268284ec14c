import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import {
  type SignInRequest,
  signedInSchema,
  signInRequestSchema,
} from '../../../api/contracts/auth.ts';
import { api } from '../../app/api.ts';
import { paths } from '../../app/paths.ts';
import { sentenceOf } from '../../app/problem.ts';
import { queryClient } from '../../app/query-client.ts';
import { markRenewed } from '../../app/refresh.ts';
import { isMarkedSignedIn, markSignedIn } from '../../app/signed-in.ts';
import { Button } from '../../components/button.tsx';
import { Form, useField } from '../../components/form.tsx';
import { Page } from '../../components/page.tsx';
import { TextField } from '../../components/text-field.tsx';
import { words } from '../../words/en.ts';

const text = words.signIn;
const labels = { email: text.email, password: text.password };

/** Only addresses of our own pages are gone back to. */
function safeBack(back: string | null): string {
  return back?.startsWith('/') && !back.startsWith('//') && !back.includes('\\')
    ? back
    : paths.home;
}

export function SignInPage() {
  const [params] = useSearchParams();
  const [signedIn] = useState(isMarkedSignedIn);
  const back = safeBack(params.get('back'));
  if (signedIn) return <Navigate to={back} replace />;
  return <SignInDocument back={back} why={params.get('why')} />;
}

function SignInDocument({ back, why }: { back: string; why: string | null }) {
  const navigate = useNavigate();
  const [problem, setProblem] = useState<string>();
  const form = useForm<SignInRequest>({
    resolver: zodResolver(signInRequestSchema),
    defaultValues: { email: '', password: '' },
  });
  const reason = why && why in text.why ? text.why[why as keyof typeof text.why] : null;

  async function signIn(request: SignInRequest) {
    setProblem(undefined);
    try {
      const answer = await api('/api/sign-in', {
        method: 'POST',
        body: request,
        answer: signedInSchema,
      });
      queryClient.clear();
      markRenewed();
      markSignedIn();
      await navigate(answer.mustChangePassword ? paths.newPassword : back, { replace: true });
    } catch (error) {
      setProblem(sentenceOf(error));
    }
  }

  return (
    <main className="mx-auto w-full max-w-page px-4 pt-10 pb-16 narrow:px-8 narrow:pt-16">
      <Page heading={text.heading} sentence={text.sentence}>
        {reason ? (
          <p role="status" className="mb-6 max-w-text border-l-4 border-kelp py-1 pl-3">
            {reason}
          </p>
        ) : null}
        <div className="grid gap-x-16 gap-y-10 wide:grid-cols-[minmax(0,1fr)_minmax(0,26rem)]">
          <Form form={form} onSubmit={signIn} labels={labels} problem={problem}>
            <TextField
              {...useField(form.control, 'email')}
              label={text.email}
              type="email"
              autoComplete="username"
              width={36}
            />
            <TextField
              {...useField(form.control, 'password')}
              label={text.password}
              type="password"
              autoComplete="current-password"
              width={36}
            />
            <Button type="submit" weight="filled" isDisabled={form.formState.isSubmitting}>
              {form.formState.isSubmitting ? text.working : text.act}
            </Button>
            <p className="max-w-text text-13 text-faded">{text.forgotten}</p>
          </Form>
          <section
            aria-labelledby="cautions"
            className="border-t border-line pt-4 wide:border-t-0 wide:border-l wide:pt-0 wide:pl-6"
          >
            <h2 id="cautions" className="font-semibold">
              {text.cautionsHeading}
            </h2>
            <ul className="mt-2 grid gap-2 text-faded">
              {text.cautions.map((caution) => (
                <li key={caution}>{caution}</li>
              ))}
            </ul>
          </section>
        </div>
      </Page>
    </main>
  );
}
