/** Named queries of accounts. */
import type { DataSource } from 'typeorm';
import type { AccountListQuery, AccountView } from '../../contracts/accounts.ts';

interface Row {
  uid: string;
  email: string;
  name: string;
  administrator: boolean;
  must_change_password: boolean;
  created_at: Date;
  disabled_at: Date | null;
  last_seen_at: Date | null;
  version: number;
  total: string;
}

const SORTS: Record<AccountListQuery['sort'], string> = {
  name: 'lower(a.name)',
  email: 'lower(a.email)',
  createdAt: 'a.created_at',
  lastSeenAt: 'last_seen_at',
  state: '(a.disabled_at IS NOT NULL)',
};

const COLUMNS = `a.uid, a.email, a.name, a.administrator, a.must_change_password, a.created_at,
  a.disabled_at, a.version,
  (SELECT max(s.last_seen_at) FROM session s WHERE s.account_id = a.id) AS last_seen_at`;

function view(row: Omit<Row, 'total'>): AccountView {
  return {
    id: row.uid,
    email: row.email,
    name: row.name,
    administrator: row.administrator,
    state: row.disabled_at ? 'disabled' : 'active',
    mustChangePassword: row.must_change_password,
    createdAt: row.created_at.toISOString(),
    disabledAt: row.disabled_at?.toISOString() ?? null,
    lastSeenAt: row.last_seen_at?.toISOString() ?? null,
    version: row.version,
  };
}

export async function listAccounts(
  db: DataSource,
  query: AccountListQuery,
): Promise<{ rows: AccountView[]; total: number }> {
  const direction = query.direction === 'asc' ? 'ASC' : 'DESC';
  // Names and addresses are searched as they are written: % and _ stand for themselves.
  const rows: Row[] = await db.query(
    `SELECT ${COLUMNS}, count(*) OVER () AS total FROM account a
      WHERE ($1::text IS NULL OR position(lower($1) in lower(a.name)) > 0
                              OR position(lower($1) in lower(a.email)) > 0)
        AND ($2::text IS NULL OR (a.disabled_at IS NOT NULL) = ($2 = 'disabled'))
        AND ($3::text IS NULL OR a.administrator = ($3 = 'administrator'))
      ORDER BY ${SORTS[query.sort]} ${direction} NULLS LAST, a.id
      LIMIT $4 OFFSET $5`,
    [
      query.text || null,
      query.state ?? null,
      query.kind ?? null,
      query.pageSize,
      (query.page - 1) * query.pageSize,
    ],
  );
  const total = rows[0] ? Number(rows[0].total) : await countBehind(db, query);
  return { rows: rows.map(view), total };
}

/** A page past the end still says how many there are. */
async function countBehind(db: DataSource, query: AccountListQuery): Promise<number> {
  if (query.page === 1) return 0;
  return (await listAccounts(db, { ...query, page: 1, pageSize: 1 })).total;
}

export async function accountView(db: DataSource, uid: string): Promise<AccountView | null> {
  const rows: Row[] = await db.query(`SELECT ${COLUMNS} FROM account a WHERE a.uid = $1`, [uid]);
  return rows[0] ? view(rows[0]) : null;
}
