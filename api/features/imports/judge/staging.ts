/** The staging table of one import: gone with the transaction, seen by nobody else. */
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { PoolClient } from 'pg';
import { from as copyFrom } from 'pg-copy-streams';
import { STAGED_COLUMNS } from '../../../import-threads/copy-text.ts';
import type { Query } from './judging.ts';

export async function createStaging(query: Query): Promise<void> {
  await query(`
    CREATE TEMP TABLE staged_row (
      line integer NOT NULL,
      subject_code text NOT NULL,
      value_text text NOT NULL,
      value double precision,
      choice text,
      limit_sign text,
      limit_value double precision,
      day_given integer,
      date_given date,
      visit_given text,
      replicate integer,
      site_given text,
      new_site text,
      new_consent_version text,
      new_consent_date date,
      new_baseline_date date,
      new_reason text,
      new_params jsonb,
      reason text,
      params jsonb,
      subject_id bigint,
      site_id bigint,
      is_new boolean NOT NULL DEFAULT false,
      consent_date date,
      baseline_date date,
      on_date date,
      planned_visit_id bigint,
      visit_id bigint,
      place text,
      content_hash bytea,
      known boolean NOT NULL DEFAULT false,
      implausible boolean NOT NULL DEFAULT false
    ) ON COMMIT DROP`);
}

/** @param onRows told how many rows have been taken, after each piece */
export async function copyIntoStaging(
  client: PoolClient,
  pieces: AsyncGenerator<{ text: string; rows: number }>,
  onRows: (rows: number) => Promise<void>,
): Promise<number> {
  let taken = 0;
  async function* texts() {
    for await (const piece of pieces) {
      yield piece.text;
      taken += piece.rows;
      await onRows(taken);
    }
  }
  const target = client.query(
    copyFrom(`COPY staged_row (${STAGED_COLUMNS.join(', ')}) FROM STDIN`),
  );
  await pipeline(Readable.from(texts()), target);
  return taken;
}
