/** Heads of the chains, written outside the database, so that a tail cut off there shows. */
import { text } from 'node:stream/consumers';
import type { DataSource } from 'typeorm';
import { z } from 'zod';
import type { ObjectStore } from '../storage/object-store.ts';

const ANCHOR_PREFIX = 'audit-heads/';

const anchorSchema = z.object({
  at: z.string(),
  heads: z.array(z.object({ chain: z.string(), seq: z.number().int(), hash: z.string() })),
});
export type Anchor = z.infer<typeof anchorSchema>;

/** The work of the hourly job. @returns how many heads were written */
export async function anchorHeads(
  db: DataSource,
  store: ObjectStore,
  clock: () => Date,
): Promise<number> {
  const rows: { name: string; head_seq: string; head_hash: string }[] = await db.query(
    'SELECT name, head_seq, head_hash FROM audit.chain ORDER BY name',
  );
  const at = clock().toISOString();
  const anchor: Anchor = {
    at,
    heads: rows.map((row) => ({
      chain: row.name,
      seq: Number(row.head_seq),
      hash: row.head_hash,
    })),
  };
  await store.put(
    `${ANCHOR_PREFIX}${at.replaceAll(':', '-')}.json`,
    Buffer.from(JSON.stringify(anchor), 'utf8'),
    { type: 'application/json' },
  );
  return anchor.heads.length;
}

/** All anchors, oldest first. @throws where one can't be read or isn't an anchor */
export async function readAnchors(store: ObjectStore): Promise<Anchor[]> {
  const anchors: Anchor[] = [];
  for (const { key } of await store.list(ANCHOR_PREFIX)) {
    anchors.push(anchorSchema.parse(JSON.parse(await text(await store.get(key)))));
  }
  return anchors;
}
