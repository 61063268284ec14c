/** Long work as jobs: what a feature defines, and how one is started. The queue itself is in queue.ts. */
import type { EntityManager } from 'typeorm';

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

export interface JobDefinition {
  kind: string;
  /** How often a run that threw is started again; 0 for work that may not be repeated by itself. */
  retries: number;
  handler: (run: JobRun) => Promise<void>;
}

export function defineJob(
  kind: string,
  handler: JobDefinition['handler'],
  options: { retries?: number } = {},
): JobDefinition {
  return { kind, handler, retries: options.retries ?? 2 };
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
}
