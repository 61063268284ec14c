/** Long work of the server, followed as it goes on; it goes on too when the page is left. */
import { useEffect, useEffectEvent, useState } from 'react';
import { type JobView, jobSchema } from '../../api/contracts/jobs.ts';
import { api } from './api.ts';

const ENDED: ReadonlySet<JobView['state']> = new Set(['done', 'failed', 'cancelled']);
const AGAIN_AFTER_MS = 2_000;

/**
 * Follows a job over server-sent events. When the stream breaks, the job is read in the usual way,
 * which also renews the sign-in, and the stream is opened again.
 * @param id of the job; null follows nothing
 * @param onEnd told once, with the last state
 */
export function useJob(id: string | null, onEnd?: (job: JobView) => void): JobView | null {
  const [job, setJob] = useState<JobView | null>(null);

  // A new `onEnd` does not start anew.
  const ended = useEffectEvent((last: JobView) => onEnd?.(last));

  useEffect(() => {
    setJob(null);
    if (!id) return;
    let source: EventSource | null = null;
    let timer: ReturnType<typeof setTimeout> | undefined;
    let stopped = false;

    const take = (next: JobView) => {
      if (stopped) return;
      setJob(next);
      if (!ENDED.has(next.state)) return;
      stop();
      ended(next);
    };
    const stop = () => {
      stopped = true;
      source?.close();
      clearTimeout(timer);
    };
    const follow = () => {
      source = new EventSource(`/api/jobs/${id}/events`);
      source.onmessage = (event) => take(jobSchema.parse(JSON.parse(event.data)));
      source.onerror = () => {
        source?.close();
        timer = setTimeout(readAgain, AGAIN_AFTER_MS);
      };
    };
    const readAgain = () => {
      api(`/api/jobs/${id}`, { answer: jobSchema })
        .then((next) => {
          take(next);
          if (!stopped) follow();
        })
        .catch((error) => {
          console.error(error);
          if (!stopped) timer = setTimeout(readAgain, AGAIN_AFTER_MS);
        });
    };
    follow();
    return stop;
  }, [id]);

  return job;
}
