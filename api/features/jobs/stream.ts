/** News of one job as server-sent events. */
import type { Request, Response } from 'express';
import { personOfSession } from '../../auth/sessions.ts';
import type { JobView } from '../../contracts/jobs.ts';
import type { AppDeps } from '../../http/deps.ts';
import type { SignedInPerson } from '../../http/request-facts.ts';
import { ownJob } from './service.ts';

/** Looks by itself now and then: a word may be lost with a connection, and a proxy cuts silent streams. */
const LOOK_MS = 5_000;

const goesOn = (job: JobView): boolean => job.state === 'waiting' || job.state === 'running';

/** Each message holds the whole job; the stream ends with the work, with the session or with the caller. */
export async function streamJob(
  deps: AppDeps,
  person: SignedInPerson,
  jobUid: string,
  req: Request,
  res: Response,
): Promise<void> {
  const first = await ownJob(deps, person, jobUid);
  res.set({ 'Content-Type': 'text/event-stream', 'X-Accel-Buffering': 'no' });
  res.flushHeaders();

  // A change that comes while we look is looked at next: one wake-up is enough for any number of them.
  let changed = false;
  let wake: (() => void) | undefined;
  const nudge = () => {
    changed = true;
    wake?.();
  };
  let left = false;
  req.on('close', () => {
    left = true;
    nudge();
  });
  const unwatch = deps.jobs.changes.watch(jobUid, nudge);
  const timer = setInterval(() => {
    res.write(': still here\n\n');
    nudge();
  }, LOOK_MS);
  try {
    let job = first;
    let sent = '';
    // One look after the watch began, for what happened in between.
    nudge();
    while (!left) {
      const text = JSON.stringify(job);
      if (text !== sent) res.write(`data: ${text}\n\n`);
      sent = text;
      if (!goesOn(job)) break;
      if (!changed) {
        await new Promise<void>((resolve) => {
          wake = resolve;
        });
      }
      changed = false;
      const alive = await personOfSession(deps.databases.masked, person.sessionUid, deps.clock());
      if (alive === null || typeof alive === 'string') break;
      job = await ownJob(deps, person, jobUid);
    }
  } finally {
    clearInterval(timer);
    unwatch();
    res.end();
  }
}
