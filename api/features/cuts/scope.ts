/** One study as the rules see it: its database by the person's role, who acts, the clock, the threads. */
import type { DataSource } from 'typeorm';
import type { AnalysisThreads } from '../../analysis-threads/threads.ts';
import type { Actor } from '../../audit/actor.ts';
import type { Clock } from '../../clock.ts';

export interface StudyScope {
  db: DataSource;
  actor: Actor;
  studyId: string;
  studyUid: string;
  clock: Clock;
  threads: AnalysisThreads;
}

/** From the context of a route below `/api/studies/:study`. */
export function scopeOf(context: {
  db: DataSource;
  actor: Actor;
  membership: { studyId: string; studyUid: string };
  deps: { clock: Clock; threads: AnalysisThreads };
}): StudyScope {
  return {
    db: context.db,
    actor: context.actor,
    studyId: context.membership.studyId,
    studyUid: context.membership.studyUid,
    clock: context.deps.clock,
    threads: context.deps.threads,
  };
}
