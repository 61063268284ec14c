import { useMe } from '../../app/session.ts';
import { notify } from '../../components/notices.tsx';
import { Page, Section } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { MySessions } from './my-sessions.tsx';
import { PasswordForm } from './password-form.tsx';
import { PreferencesForm } from './preferences-form.tsx';

const text = words.account;

export function AccountPage() {
  const { account } = useMe();
  return (
    <Page heading={text.heading} sentence={text.sentence(account.name, account.email)}>
      <Section heading={text.preferences}>
        <PreferencesForm key={account.version} account={account} />
      </Section>
      <Section heading={text.passwordHeading}>
        <PasswordForm onChanged={() => notify(text.passwordChanged)} />
      </Section>
      <Section heading={text.sessionsHeading} sentence={text.sessionsSentence}>
        <MySessions />
      </Section>
    </Page>
  );
}
