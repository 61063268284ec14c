import { useEffect, useSyncExternalStore } from 'react';

/** One line of the page's live region; nothing floats. */
type Notice = { id: number; text: string; urgent: boolean } | null;

let current: Notice = null;
let counter = 0;
const listeners = new Set<() => void>();

function publish(next: Notice): void {
  current = next;
  for (const listener of listeners) listener();
}

/** Says what has happened, until the next notice or the next page. */
export function notify(text: string, options: { urgent?: boolean } = {}): void {
  counter += 1;
  publish({ id: counter, text, urgent: options.urgent ?? false });
}

export function clearNotice(): void {
  if (current) publish(null);
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/**
 * The live region; the layout shows it once, over the page, with the path as its key: what was said of one
 * page is not said on the next.
 */
export function Notices() {
  const notice = useSyncExternalStore(subscribe, () => current);
  useEffect(() => clearNotice, []);
  return (
    <div aria-live={notice?.urgent ? 'assertive' : 'polite'} className="no-print">
      {notice ? (
        <p
          key={notice.id}
          className={`mb-4 max-w-text border-l-4 py-1 pl-3 ${notice.urgent ? 'border-stop' : 'border-kelp'}`}
        >
          {notice.text}
        </p>
      ) : null}
    </div>
  );
}
