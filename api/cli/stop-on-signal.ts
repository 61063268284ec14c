import { platformWords } from '../words/platform.ts';

/**
 * Stops in order at the first signal, and at once at the second. The private PostgreSQL is told by the
 * kernel when this process goes, so nothing is left behind either way.
 */
export function stopOnSignal(stop: () => Promise<void>): void {
  let stopping = false;
  const onSignal = () => {
    if (stopping) process.exit(130);
    stopping = true;
    console.log(`\n${platformWords.stopping}`);
    stop().then(
      () => {
        console.log(platformWords.stopped);
        process.exit(0);
      },
      (error: unknown) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, onSignal);
}
