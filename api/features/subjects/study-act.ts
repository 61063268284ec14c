/** What every act on the subjects of one study needs, and the checks that all of them share. */
import type { DataSource } from 'typeorm';
import { Study } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction, type Tx } from '../../audit/transaction.ts';
import type { Clock } from '../../clock.ts';
import { Problem } from '../../http/problems.ts';
import { dayInZone } from '../cuts/days.ts';

export interface StudyAct {
  tx: Tx;
  /** The moment of the act, by the injected clock. */
  now: Date;
  study: Study;
  /** Whose subjects this person reaches; null: those of every site. */
  siteIds: readonly string[] | null;
  /** Key of the account that acts. */
  accountId: string;
}

export interface StudyActSettings {
  db: DataSource;
  actor: Actor;
  clock: Clock;
  studyUid: string;
  siteIds: readonly string[] | null;
}

/**
 * Runs one act on a study: one transaction, with its audit entries.
 *
 * The study's row is held in share until the end, so that it can't be locked or closed half-way. An act
 * after that is refused, and that it was tried stays in the trail.
 *
 * @throws Problem `not_found` for an unknown study, `study_not_open` once it is locked or closed
 */
export async function actInStudy<T>(
  settings: StudyActSettings,
  work: (act: StudyAct) => Promise<T>,
): Promise<T> {
  try {
    return await actWhileOpen(settings, work);
  } catch (error) {
    if (error instanceof Problem && error.code === 'study_not_open') {
      await auditRefusal(settings, error);
    }
    throw error;
  }
}

export async function auditRefusal(
  settings: Omit<StudyActSettings, 'siteIds'>,
  problem: Problem,
): Promise<void> {
  const { db, actor, clock, studyUid } = settings;
  await inTransaction(db, actor, async (tx) =>
    tx.audit({
      at: clock(),
      studyUid,
      action: 'act refused: study not open',
      entity: 'study',
      entityUid: studyUid,
      after: problem.params,
    }),
  );
}

function actWhileOpen<T>(
  settings: StudyActSettings,
  work: (act: StudyAct) => Promise<T>,
): Promise<T> {
  const { db, actor, clock, studyUid, siteIds } = settings;
  return inTransaction(db, actor, async (tx) => {
    const study = await tx.manager
      .getRepository(Study)
      .createQueryBuilder('study')
      .setLock('pessimistic_read')
      .where('study.uid = :studyUid', { studyUid })
      .getOne();
    if (!study) {
      throw new Problem('not_found');
    }
    if (study.state !== 'open') {
      throw new Problem('study_not_open', { state: study.state });
    }
    return work({ tx, now: clock(), study, siteIds, accountId: actor.accountId });
  });
}

/** The calendar day at a site when the act takes place. */
export function todayAt(act: StudyAct, timeZone: string): string {
  return dayInZone(act.now, timeZone);
}
