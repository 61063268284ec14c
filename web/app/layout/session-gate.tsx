import { useQuery } from '@tanstack/react-query';
import { useCallback, useEffect } from 'react';
import { Navigate, useLocation, useNavigate } from 'react-router-dom';
import { Failed, Loading } from '../../components/states.tsx';
import { api, onSignedOut } from '../api.ts';
import { useIdleLock } from '../idle.ts';
import { paths } from '../paths.ts';
import { ApiProblem } from '../problem.ts';
import { meQueryOptions } from '../session.ts';
import { forgetSignIn, isMarkedSignedIn, onForgottenElsewhere, type Why } from '../signed-in.ts';
import { applyTheme } from '../theme.ts';
import { Layout } from './layout.tsx';

/** Leaves for the sign-in page; the way back is kept only where the same person may take it. */
function useLeave(): (why: Why) => void {
  const navigate = useNavigate();
  const { pathname } = useLocation();
  return useCallback(
    (why: Why) => {
      forgetSignIn(why);
      const back =
        why === 'out' || pathname === paths.home ? '' : `&back=${encodeURIComponent(pathname)}`;
      void navigate(`${paths.signIn}?why=${why}${back}`, { replace: true });
    },
    [navigate, pathname],
  );
}

/** Everything but the sign-in page stands behind this gate. */
export function SessionGate() {
  const location = useLocation();
  if (!isMarkedSignedIn()) {
    const back =
      location.pathname === paths.home ? '' : `?back=${encodeURIComponent(location.pathname)}`;
    return <Navigate to={paths.signIn + back} replace />;
  }
  return <OpenGate />;
}

function OpenGate() {
  const me = useQuery(meQueryOptions);
  const location = useLocation();
  const leave = useLeave();
  const theme = me.data?.account.theme;

  const signOut = useCallback(
    (why: Why) => {
      // The page is left whether or not the server hears of it; its own idle limit is the last word.
      void api('/api/sign-out', { method: 'POST' })
        .catch(console.error)
        .finally(() => leave(why));
    },
    [leave],
  );
  const onIdle = useCallback(() => signOut('idle'), [signOut]);
  useIdleLock(onIdle);
  useEffect(() => onSignedOut(() => leave('ended')), [leave]);
  useEffect(() => onForgottenElsewhere(leave), [leave]);
  useEffect(() => {
    if (theme) applyTheme(theme);
  }, [theme]);

  if (me.error instanceof ApiProblem && me.error.status === 401) return null;
  if (me.error && !me.data) {
    return (
      <main className="mx-auto max-w-page p-6">
        <Failed error={me.error} again={() => void me.refetch()} />
      </main>
    );
  }
  if (!me.data) {
    return (
      <main className="mx-auto max-w-page p-6">
        <Loading />
      </main>
    );
  }
  if (me.data.account.mustChangePassword && location.pathname !== paths.newPassword) {
    return <Navigate to={paths.newPassword} replace />;
  }
  return <Layout signOut={() => signOut('out')} />;
}
