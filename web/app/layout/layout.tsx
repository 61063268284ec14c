import { Outlet, useLocation } from 'react-router-dom';
import { Notices } from '../../components/notices.tsx';
import { words } from '../../words/en.ts';
import { useMe } from '../session.ts';
import { Places } from './places.tsx';
import { TopBar } from './top-bar.tsx';
import { useShownMembership } from './use-shown-membership.ts';

/** The frame of every page: top bar, places, notices, the page, one line of caution. */
export function Layout({ signOut }: { signOut: () => void }) {
  const me = useMe();
  const membership = useShownMembership();
  const { pathname } = useLocation();

  return (
    <div className="flex min-h-dvh flex-col">
      <a href="#content" className="absolute left-2 -top-12 z-30 bg-panel px-3 py-2 focus:top-2">
        {words.topBar.skip}
      </a>
      <TopBar me={me} membership={membership} signOut={signOut} />
      {me.account.mustChangePassword ? null : <Places me={me} membership={membership} />}
      <main
        id="content"
        tabIndex={-1}
        className="mx-auto w-full max-w-page grow px-4 pt-6 pb-16 outline-none narrow:px-8"
      >
        <Notices key={pathname} />
        <Outlet key={membership?.study.id ?? 'none'} />
      </main>
      <footer className="no-print mx-auto w-full max-w-page px-4 pb-6 text-13 text-faded narrow:px-8">
        <p className="border-t border-line pt-3">{words.topBar.caution}</p>
      </footer>
    </div>
  );
}
