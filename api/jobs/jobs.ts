/** Long work as jobs: what a feature defines, and how one is started. The queue itself is in queue.ts. */
import type { EntityManager } from 'typeorm';
import type { JobChanges } from './changes.ts';

/** What the work gets: its own id and the record it is about; everything else it reads itself. */
export interface JobRun {
  jobUid: string;
  subjectUid: string | null;
  studyId: string | null;
  accountId: string | null;
  /** Tells how far it is. Cheap: written at most a few times a second. */
  progress(done: number, total: number | null): Promise<void>;
  /** True once somebody asked to stop; ask it between steps and return. */
  cancelled(): Promise<boolean>;
}

/** A handler may run again where its machine was lost, so it has to find out what it did already. */
export interface JobDefinition {
  kind: string;
  handler: (run: JobRun) => Promise<void>;
}

export function defineJob(kind: string, handler: JobDefinition['handler']): JobDefinition {
  return { kind, handler };
}

/** Ids only: nothing of a subject, a reading or an arm goes into the queue. */
export interface JobOrder {
  kind: string;
  subjectUid: string | null;
  studyId: string | null;
  accountId: string | null;
}

export interface Jobs {
  /**
   * Puts work into the queue within a transaction: it begins only if that commits.
   * @returns the uid under which its progress is followed
   */
  start(manager: EntityManager, order: JobOrder): Promise<string>;
  /** Tells when a job has changed. */
  readonly changes: Pick<JobChanges, 'watch'>;
}
