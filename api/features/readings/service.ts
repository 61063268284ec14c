/** Correcting readings. A correction never overwrites: the old content stays as a revision. */
import {
  CORRECTION_REASONS,
  type CorrectionReason,
  Reading,
  ReadingRevision,
  type Subject,
} from '../../../database/entities/index.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyAct } from '../subjects/study-act.ts';
import type { ReadingCells, ReadingInput } from './check-content.ts';
import { takeContent } from './store-readings.ts';

export interface CorrectReadingInput extends ReadingInput {
  readingUid: string;
  /** Version that was read. */
  version: number;
  reason: CorrectionReason;
  /** Needed for `other`. */
  reasonText?: string | null;
  explanation?: string | null;
}

/**
 * @throws Problem `not_found` also for a reading of another site, `stale_version`, `correction_reason`,
 * `reading_unchanged`, or what is wrong with the content
 */
export async function correctReading(act: StudyAct, input: CorrectReadingInput): Promise<Reading> {
  const { manager } = act.tx;
  const reading = await manager
    .getRepository(Reading)
    .createQueryBuilder('reading')
    .innerJoinAndSelect('reading.measure', 'measure')
    .innerJoinAndMapOne('reading.subject', 'subject', 'subject', 'subject.id = reading.subject_id')
    .setLock('pessimistic_write', undefined, ['reading'])
    .where('reading.uid = :uid AND reading.study_id = :studyId', {
      uid: input.readingUid,
      studyId: act.study.id,
    })
    .getOne();
  const subject = (reading as (Reading & { subject?: Subject }) | null)?.subject;
  const reachable = subject && (act.siteIds === null || act.siteIds.includes(subject.siteId));
  if (!reading?.measure || !reachable) {
    throw new Problem('not_found');
  }
  if (input.version !== reading.version) {
    throw new Problem('stale_version', { given: input.version, held: reading.version });
  }
  const reasonText = input.reasonText?.trim() || null;
  if (
    !CORRECTION_REASONS.includes(input.reason) ||
    (input.reason === 'other' && reasonText === null)
  ) {
    throw new Problem('correction_reason');
  }
  const { cells, explanation } = takeContent(reading.measure, input);
  const old = cellsOf(reading);
  if (JSON.stringify(old) === JSON.stringify(cells)) {
    throw new Problem('reading_unchanged');
  }

  await manager.getRepository(ReadingRevision).insert({
    readingId: reading.id,
    at: act.now,
    byAccount: act.accountId,
    oldValue: old.value,
    oldChoice: old.choice,
    oldLimitSign: old.limitSign,
    oldLimitValue: old.limitValue,
    oldNotDone: old.notDone,
    newValue: cells.value,
    newChoice: cells.choice,
    newLimitSign: cells.limitSign,
    newLimitValue: cells.limitValue,
    newNotDone: cells.notDone,
    reason: input.reason,
    reasonText,
  });
  const version = reading.version + 1;
  await manager
    .getRepository(Reading)
    .update({ id: reading.id }, { ...cells, explanation, version });
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: 'reading corrected',
    entity: 'reading',
    entityUid: reading.uid,
    before: { ...old, version: reading.version },
    after: { ...cells, explanation, version },
    reason: reasonText ? `${input.reason}: ${reasonText}` : input.reason,
  });
  return manager.getRepository(Reading).findOneByOrFail({ id: reading.id });
}

function cellsOf(reading: Reading): ReadingCells {
  const { value, choice, limitSign, limitValue, notDone } = reading;
  return { value, choice, limitSign, limitValue, notDone };
}
