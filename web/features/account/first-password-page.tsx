import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths.ts';
import { meQueryOptions } from '../../app/session.ts';
import { notify } from '../../components/notices.tsx';
import { Page } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { PasswordForm } from './password-form.tsx';

const text = words.account;

/** The only page that opens while a temporary password waits to be changed. */
export function FirstPasswordPage() {
  const client = useQueryClient();
  const navigate = useNavigate();

  async function goOn() {
    await client.refetchQueries({ queryKey: meQueryOptions.queryKey });
    await navigate(paths.home, { replace: true });
    notify(text.passwordChanged);
  }

  return (
    <Page heading={text.firstHeading} sentence={text.firstSentence}>
      <PasswordForm onChanged={() => void goOn()} />
    </Page>
  );
}
