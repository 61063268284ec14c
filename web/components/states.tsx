import type { UseQueryResult } from '@tanstack/react-query';
import { type ReactNode, useEffect, useState } from 'react';
import { ApiProblem, sentenceOf } from '../app/problem.ts';
import { words } from '../words/en.ts';
import { Button, ButtonLink } from './button.tsx';

/** Nothing is here yet: what it is for, and the one act that fills it. */
export function Empty({ what, act }: { what: string; act?: ReactNode }) {
  return (
    <div className="border-y border-line py-6">
      <p className="max-w-text text-faded">{what}</p>
      {act ? <div className="mt-3">{act}</div> : null}
    </div>
  );
}

/** Said only after 300 ms, so that a quick answer does not flicker. */
export function Loading({ what = words.states.loading }: { what?: string }) {
  const [late, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), 300);
    return () => clearTimeout(timer);
  }, []);
  return (
    <p role="status" className="min-h-24 py-6 text-faded">
      {late ? what : null}
    </p>
  );
}

/** What failed, whether anything was kept, a way on, and a number for support. */
export function Failed({ error, again }: { error: unknown; again?: () => void }) {
  if (error instanceof ApiProblem && error.status === 403) {
    return <Forbidden sentence={error.message} />;
  }
  const requestId = error instanceof ApiProblem ? error.requestId : null;
  const missing = error instanceof ApiProblem && error.status === 404;
  return (
    <div role="alert" className="border-l-4 border-stop py-1 pl-3">
      <h2 className="text-17 font-semibold">
        {missing ? words.states.notFoundHeading : words.states.failedHeading}
      </h2>
      <p className="max-w-text">{sentenceOf(error)}</p>
      {requestId && !missing ? (
        <p className="text-13 text-faded">{words.states.failedNumber(requestId)}</p>
      ) : null}
      <div className="mt-3">
        {again && !missing ? (
          <Button onPress={again}>{words.common.tryAgain}</Button>
        ) : (
          <ButtonLink to="/">{words.states.notFoundNext}</ButtonLink>
        )}
      </div>
    </div>
  );
}

/** Which roles may, and whom to ask. */
export function Forbidden({ sentence }: { sentence: string }) {
  return (
    <div className="border-l-4 border-edge py-1 pl-3">
      <h2 className="text-17 font-semibold">{words.states.forbiddenHeading}</h2>
      <p className="max-w-text">{sentence}</p>
      <div className="mt-3">
        <ButtonLink to="/">{words.states.notFoundNext}</ButtonLink>
      </div>
    </div>
  );
}

/** Shows a query: its answer, or the state that stands in its place. */
export function Answer<Data>({
  query,
  children,
  loading,
}: {
  query: Pick<UseQueryResult<Data>, 'data' | 'error' | 'isPending' | 'refetch'>;
  children: (data: Data) => ReactNode;
  loading?: ReactNode;
}) {
  if (query.data !== undefined) return children(query.data);
  if (query.error) return <Failed error={query.error} again={() => void query.refetch()} />;
  return loading ?? <Loading />;
}
