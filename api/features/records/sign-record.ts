/** Signing a record: a second act, with the password again, bound to the content that was read. */
import type { z } from 'zod';
import { Signature } from '../../../database/entities/index.ts';
import type { Actor } from '../../audit/actor.ts';
import { inTransaction } from '../../audit/transaction.ts';
import type { signRecordRequestSchema } from '../../contracts/analysis.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyScope } from '../cuts/scope.ts';
import {
  RECORD,
  type StoredRecord,
  type StoredSignature,
  signaturesOf,
} from './record-repository.ts';
import { currentSha256 } from './views.ts';

type Body = z.infer<typeof signRecordRequestSchema>;
type Meaning = Body['meaning'];

/** What this person has not yet signed and may: only who ran it can sign as having run it. */
export function meaningsLeft(
  record: StoredRecord,
  signatures: readonly StoredSignature[],
  actor: Actor,
): Meaning[] {
  const mine = signatures.filter((signature) => signature.accountUid === actor.accountUid);
  const meanings: Meaning[] =
    record.createdByUid === actor.accountUid
      ? ['I ran this analysis', 'I reviewed this analysis']
      : ['I reviewed this analysis'];
  return meanings.filter((meaning) => !mine.some((signature) => signature.meaning === meaning));
}

/**
 * The password has been entered again and found right before this.
 *
 * @throws Problem record_content_differs, record_not_run_by_you, record_signed_already
 */
export async function signRecord(
  scope: StudyScope,
  record: StoredRecord,
  body: Pick<Body, 'meaning' | 'contentSha256'>,
): Promise<void> {
  const sha256 = currentSha256(record);
  if (body.contentSha256 !== sha256 || record.contentSha256 !== sha256) {
    throw new Problem('record_content_differs');
  }
  const { actor } = scope;
  if (body.meaning === 'I ran this analysis' && record.createdByUid !== actor.accountUid) {
    throw new Problem('record_not_run_by_you', { name: record.createdBy });
  }
  const now = scope.clock();
  await inTransaction(scope.db, actor, async (tx) => {
    // Two clicks at once: the second waits here and then finds the first one's signature.
    await tx.manager.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 0))', [
      `signature ${record.uid}`,
    ]);
    const signatures = await signaturesOf(tx.manager, record.uid);
    if (!meaningsLeft(record, signatures, actor).includes(body.meaning)) {
      throw new Problem('record_signed_already');
    }
    const [person]: { name: string; zone: string | null }[] = await tx.manager.query(
      'SELECT name, time_zone AS zone FROM account WHERE id = $1',
      [actor.accountId],
    );
    const repository = tx.manager.getRepository(Signature);
    const signature = await repository.save(
      repository.create({
        studyId: scope.studyId,
        entityKind: RECORD,
        entityUid: record.uid,
        accountId: actor.accountId,
        signedName: person?.name ?? actor.name,
        signedAt: now,
        zone: person?.zone ?? 'UTC',
        meaning: body.meaning,
        contentSha256: sha256,
      }),
    );
    tx.audit({
      at: now,
      studyUid: scope.studyUid,
      action: 'record signed',
      entity: 'signature',
      entityUid: signature.uid,
      after: { record: record.uid, meaning: body.meaning, contentSha256: sha256 },
    });
  });
}
