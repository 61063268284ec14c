import { useRouteError } from 'react-router-dom';
import { Button } from '../../components/button.tsx';
import { Failed } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { ApiProblem } from '../problem.ts';

/** A fault in a page leaves the frame and the other pages standing. */
export function RouteFailed() {
  const error = useRouteError();
  if (error instanceof ApiProblem) return <Failed error={error} />;
  return (
    <div role="alert" className="m-6 border-l-4 border-stop py-1 pl-3">
      <h1 className="text-17 font-semibold">{words.states.brokenHeading}</h1>
      <p className="max-w-text">{words.states.broken}</p>
      <div className="mt-3">
        <Button onPress={() => window.location.reload()}>{words.states.reload}</Button>
      </div>
    </div>
  );
}
