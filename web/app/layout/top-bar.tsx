import { lazy, Suspense } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { words } from '../../words/en.ts';
import { paths } from '../paths.ts';
import { rolesInWords } from '../roles.ts';
import type { Me, Membership } from '../session.ts';
import { MenuButton } from './menu-button.tsx';

const FindSubject = lazy(() =>
  import('./find-subject.tsx').then((module) => ({ default: module.FindSubject })),
);

type TopBarProps = { me: Me; membership: Membership | null; signOut: () => void };

/** Study, role in words, search by subject code for those who see subjects, account. */
export function TopBar({ me, membership, signOut }: TopBarProps) {
  const navigate = useNavigate();
  const several = me.memberships.length > 1;
  const duty = membership
    ? rolesInWords(membership)
    : me.account.administrator
      ? words.topBar.administrator
      : null;

  return (
    <header className="border-b border-line">
      <div className="mx-auto flex max-w-page flex-wrap items-center gap-x-6 gap-y-1 px-4 py-2 narrow:px-8">
        <Link
          to={membership ? paths.study(membership.study.id) : paths.home}
          className="target inline-flex min-h-9 items-center font-semibold text-ink no-underline"
        >
          {words.common.product}
        </Link>
        {membership && several ? (
          <MenuButton
            className="font-semibold"
            label={membership.study.name}
            accessibleName={`${membership.study.name}. ${words.topBar.chooseStudy}`}
            items={me.memberships.map((each) => ({
              id: each.study.id,
              label: each.study.name,
              note: rolesInWords(each),
            }))}
            onAction={(study) => void navigate(paths.study(study))}
          />
        ) : null}
        {membership && !several ? (
          <span className="font-semibold">{membership.study.name}</span>
        ) : null}
        {duty ? <span className="text-faded">{duty}</span> : null}
        <div className="no-print flex w-full flex-wrap items-center justify-between gap-x-6 narrow:ml-auto narrow:w-auto">
          {membership?.places.includes('subjects') ? (
            <Suspense fallback={<span className="w-56" />}>
              <FindSubject study={membership.study.id} />
            </Suspense>
          ) : null}
          <MenuButton
            label={words.topBar.account}
            items={[
              { id: paths.account, label: words.topBar.accountOf(me.account.name) },
              { id: paths.help, label: words.topBar.help },
              { id: 'sign-out', label: words.topBar.signOut },
            ]}
            onAction={(id) => (id === 'sign-out' ? signOut() : void navigate(id))}
          />
        </div>
      </div>
    </header>
  );
}
