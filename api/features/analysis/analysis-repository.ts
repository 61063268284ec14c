/** Queries on specifications, opened checks and acknowledgements. */
import type { EntityManager } from 'typeorm';
import type { SpecificationInput } from '../../contracts/analysis.ts';
import { specificationSha256 } from './specification.ts';

export interface StoredSpecification extends SpecificationInput {
  id: string;
  sha256: string;
  number: number;
}

export interface StoredAcknowledgement {
  id: string;
  by: string;
  at: Date;
  reason: string;
}

const COLUMNS = `id::text, measure, axis, unit, group_by AS "group", sha256, number`;

export async function findSpecification(
  manager: EntityManager,
  cut: { id: string; uid: string },
  input: SpecificationInput,
): Promise<StoredSpecification | null> {
  const [row]: StoredSpecification[] = await manager.query(
    `SELECT ${COLUMNS} FROM specification WHERE cut_id = $1 AND sha256 = $2`,
    [cut.id, specificationSha256(cut.uid, input)],
  );
  return row ?? null;
}

/**
 * Finds the specification, or counts it as the next one of its measure on this cut.
 *
 * Two people may ask the same new question at once: the lock on cut and measure makes the second wait
 * and then find the first one's row, so that numbers have no gap and no twin.
 */
export async function ensureSpecification(
  manager: EntityManager,
  cut: { id: string; uid: string },
  input: SpecificationInput,
  now: Date,
): Promise<StoredSpecification> {
  await manager.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 0))', [
    `specification ${cut.uid} ${input.measure}`,
  ]);
  const found = await findSpecification(manager, cut, input);
  if (found !== null) {
    return found;
  }
  const [row]: StoredSpecification[] = await manager.query(
    `INSERT INTO specification (cut_id, measure, axis, unit, group_by, sha256, number, created_at)
     SELECT $1::bigint, $2::text, $3, $4, $5::boolean, $6, 1 + count(*)::int, $7::timestamptz
       FROM specification WHERE cut_id = $1 AND measure = $2::text
     RETURNING ${COLUMNS}`,
    [
      cut.id,
      input.measure,
      input.axis,
      input.unit,
      input.group,
      specificationSha256(cut.uid, input),
      now,
    ],
  );
  if (row === undefined) {
    throw new Error('the specification was not written');
  }
  return row;
}

/** The check as this person saw it last, or null when they never opened it. */
export async function findOpening(
  manager: EntityManager,
  specificationId: string,
  accountId: string,
): Promise<{ repeats: boolean } | null> {
  const [row]: { repeats: boolean }[] = await manager.query(
    `SELECT (result::jsonb->'structure'->>'subjects_with_repeats')::int > 0 AS repeats
       FROM check_opening WHERE specification_id = $1 AND account_id = $2
      ORDER BY id DESC LIMIT 1`,
    [specificationId, accountId],
  );
  return row ?? null;
}

/** Only this person's own reason for this specification opens the lock for them. */
export async function findAcknowledgement(
  manager: EntityManager,
  specificationId: string,
  accountId: string,
): Promise<StoredAcknowledgement | null> {
  const [row]: StoredAcknowledgement[] = await manager.query(
    `SELECT acknowledgement.id::text, account.name AS by, acknowledgement.at, acknowledgement.reason
       FROM acknowledgement JOIN account ON account.id = acknowledgement.account_id
      WHERE acknowledgement.specification_id = $1 AND acknowledgement.account_id = $2
      ORDER BY acknowledgement.at DESC, acknowledgement.id DESC LIMIT 1`,
    [specificationId, accountId],
  );
  return row ?? null;
}
