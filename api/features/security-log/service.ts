/** The chain of the installation, as its administrator reads it. */
import type { DataSource } from 'typeorm';
import { INSTALLATION_CHAIN } from '../../audit/entry-body.ts';
import {
  type SecurityEntry,
  type SecurityLogFilter,
  type SecurityLogQuery,
  securityActions,
} from '../../contracts/accounts.ts';
import { csvLine } from '../../http/files.ts';
import { securityLogWords } from '../../words/security-log.ts';

interface Row {
  seq: string;
  at: Date;
  action: string;
  by: string | null;
  about: string | null;
  address: string | null;
  reason: string | null;
  hash: string;
}

/** Only what is about accounts and sessions: a name of a study is none of the administrator's business. */
const WHERE = `e.chain = '${INSTALLATION_CHAIN}' AND e.action = ANY($1)
  AND ($2::text IS NULL OR e.action = $2)
  AND ($3::text IS NULL OR position(lower($3) in lower(coalesce(e.actor_name, ''))) > 0
                        OR position(lower($3) in lower(coalesce(a.name, ''))) > 0)
  AND ($4::date IS NULL OR e.at >= $4::date::timestamp AT TIME ZONE 'UTC')
  AND ($5::date IS NULL OR e.at < ($5::date + 1)::timestamp AT TIME ZONE 'UTC')`;

const FROM = `FROM audit.entry e
  LEFT JOIN account a ON e.entity = 'account' AND a.uid = e.entity_uid`;

const SELECT = `SELECT e.seq, e.at, e.action, e.actor_name AS by, a.name AS about,
  e.after->>'address' AS address, e.reason, e.hash ${FROM}`;

const valuesOf = (filter: SecurityLogFilter): unknown[] => [
  securityActions,
  filter.action ?? null,
  filter.text || null,
  filter.from ?? null,
  filter.until ?? null,
];

function view(row: Row): SecurityEntry {
  return { ...row, number: Number(row.seq), at: row.at.toISOString() };
}

const directionOf = (filter: SecurityLogFilter) => (filter.direction === 'asc' ? 'ASC' : 'DESC');

export async function readLog(
  db: DataSource,
  query: SecurityLogQuery,
): Promise<{ rows: SecurityEntry[]; total: number }> {
  const rows: Row[] = await db.query(
    `${SELECT} WHERE ${WHERE} ORDER BY e.seq ${directionOf(query)} LIMIT $6 OFFSET $7`,
    [...valuesOf(query), query.pageSize, (query.page - 1) * query.pageSize],
  );
  const counted: { total: string }[] = await db.query(
    `SELECT count(*) AS total ${FROM} WHERE ${WHERE}`,
    valuesOf(query),
  );
  return { rows: rows.map(view), total: Number(counted[0]?.total ?? 0) };
}

const PAGE = 1_000;

/** All entries of the filter as CSV, read in pieces: the log of years does not have to fit in memory. */
export async function* logAsCsv(db: DataSource, filter: SecurityLogFilter): AsyncGenerator<string> {
  yield csvLine(securityLogWords.columns);
  const ascending = filter.direction === 'asc';
  let last = ascending ? '0' : String(Number.MAX_SAFE_INTEGER);
  for (;;) {
    const rows: Row[] = await db.query(
      `${SELECT} WHERE ${WHERE} AND e.seq ${ascending ? '>' : '<'} $6
        ORDER BY e.seq ${directionOf(filter)} LIMIT ${PAGE}`,
      [...valuesOf(filter), last],
    );
    for (const row of rows) {
      const { number, at, action, by, about, address, reason, hash } = view(row);
      yield csvLine([number, at, action, by, about, address, reason, hash]);
    }
    const end = rows.at(-1);
    if (!end || rows.length < PAGE) return;
    last = end.seq;
  }
}
