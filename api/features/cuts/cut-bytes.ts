/** The stored bytes of a cut: what was hashed is what is kept, served and analysed. */
import type { EntityManager } from 'typeorm';

/** Yields the chunks in order, one at a time, so that a download never holds a whole cut. */
export async function* chunksOfCut(manager: EntityManager, cutId: string): AsyncGenerator<Buffer> {
  for (let seq = 0; ; seq++) {
    const [row]: { bytes: Buffer }[] = await manager.query(
      'SELECT bytes FROM cut_chunk WHERE cut_id = $1 AND seq = $2',
      [cutId, seq],
    );
    if (row === undefined) {
      return;
    }
    yield row.bytes;
  }
}

/** The whole cut in memory of its own, to be handed to a computing thread. */
export async function bytesOfCut(manager: EntityManager, cutId: string): Promise<Uint8Array> {
  const rows: { bytes: Buffer }[] = await manager.query(
    'SELECT bytes FROM cut_chunk WHERE cut_id = $1 ORDER BY seq',
    [cutId],
  );
  const whole = new Uint8Array(rows.reduce((sum, row) => sum + row.bytes.length, 0));
  let at = 0;
  for (const { bytes } of rows) {
    whole.set(bytes, at);
    at += bytes.length;
  }
  return whole;
}
