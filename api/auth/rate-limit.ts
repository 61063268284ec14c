/** Counters of tries, kept in PostgreSQL so that every server sees the same ones. */
import type { DataSource } from 'typeorm';

export interface Limit {
  key: string;
  /** Tries allowed in one window. */
  most: number;
  windowMinutes: number;
}

export interface Verdict {
  allowed: boolean;
  /** True for the one try that first met the limit in this window. */
  justReached: boolean;
  /** Seconds until the window that refused ends. */
  waitSeconds: number;
}

const windowStart = (limit: Limit, now: Date): Date => {
  const length = limit.windowMinutes * 60_000;
  return new Date(Math.floor(now.getTime() / length) * length);
};

/**
 * Counts a try before it is judged, so that tries sent all at once can't slip past together.
 * A try that turns out right is given back by `forgiveTry`.
 */
export async function countTry(
  db: DataSource,
  limits: readonly Limit[],
  now: Date,
): Promise<Verdict> {
  const verdict: Verdict = { allowed: true, justReached: false, waitSeconds: 0 };
  for (const limit of limits) {
    const start = windowStart(limit, now);
    const rows: { count: number }[] = await db.query(
      `INSERT INTO rate_counter AS c (key, window_start, count) VALUES ($1, $2, 1)
       ON CONFLICT (key, window_start) DO UPDATE SET count = c.count + 1 RETURNING count`,
      [limit.key, start],
    );
    const count = rows[0]?.count ?? 0;
    if (count <= limit.most) continue;
    verdict.allowed = false;
    verdict.justReached ||= count === limit.most + 1;
    const ends = start.getTime() + limit.windowMinutes * 60_000;
    verdict.waitSeconds = Math.max(verdict.waitSeconds, Math.ceil((ends - now.getTime()) / 1_000));
  }
  return verdict;
}

export async function forgiveTry(
  db: DataSource,
  limits: readonly Limit[],
  now: Date,
): Promise<void> {
  for (const limit of limits) {
    await db.query(
      'UPDATE rate_counter SET count = greatest(count - 1, 0) WHERE key = $1 AND window_start = $2',
      [limit.key, windowStart(limit, now)],
    );
  }
}

/** Windows that ended long ago count nothing any more. */
export async function clearOldCounters(db: DataSource, now: Date): Promise<void> {
  await db.query(
    "DELETE FROM rate_counter WHERE window_start < $1::timestamptz - interval '2 days'",
    [now],
  );
}
