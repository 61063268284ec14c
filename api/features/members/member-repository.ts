/** Named queries of the people of one study. */
import type { DataSource, EntityManager } from 'typeorm';
import { studyRoles } from '../../contracts/common.ts';
import type { MemberList, MemberListQuery, MemberView } from '../../contracts/members.ts';

interface Row {
  uid: string;
  name: string;
  email: string;
  disabled: boolean;
  roles: MemberView['roles'];
  chair: boolean;
  since: Date;
  version: string;
  sites: MemberView['sites'];
  total: string;
}

const SORTS: Record<MemberListQuery['sort'], string> = {
  name: 'lower(name)',
  email: 'lower(email)',
  role: 'roles',
  since: 'since',
};

/**
 * One row a person. The version counts every change ever made to any of their duties here, those taken
 * away included, so that it never comes back to an earlier number.
 */
const MEMBERS = `SELECT a.id, a.uid, a.name, a.email, a.disabled_at IS NOT NULL AS disabled,
    array_agg(m.role ORDER BY array_position($2::text[], m.role)) AS roles,
    bool_or(m.chair) AS chair, min(m.created_at) AS since,
    (SELECT sum(all_of.version) FROM membership all_of
      WHERE all_of.study_id = $1 AND all_of.account_id = a.id) AS version,
    coalesce((SELECT jsonb_agg(jsonb_build_object('id', t.uid, 'code', t.code, 'name', t.name) ORDER BY t.code)
                FROM membership c JOIN membership_site ms ON ms.membership_id = c.id JOIN site t ON t.id = ms.site_id
               WHERE c.study_id = $1 AND c.account_id = a.id AND c.removed_at IS NULL), '[]') AS sites
  FROM membership m JOIN account a ON a.id = m.account_id
 WHERE m.study_id = $1 AND m.removed_at IS NULL
 GROUP BY a.id`;

function view(row: Row): MemberView {
  return {
    id: row.uid,
    name: row.name,
    email: row.email,
    roles: row.roles,
    chair: row.chair,
    sites: row.sites,
    since: row.since.toISOString(),
    disabled: row.disabled,
    version: Number(row.version),
  };
}

export async function listMembers(
  db: DataSource,
  studyId: string,
  query: MemberListQuery,
): Promise<MemberList> {
  const direction = query.direction === 'asc' ? 'ASC' : 'DESC';
  const filter = `($3::text IS NULL OR position(lower($3) in lower(name)) > 0
                                    OR position(lower($3) in lower(email)) > 0)
              AND ($4::text IS NULL OR $4 = ANY(roles))`;
  const values = [studyId, studyRoles, query.text || null, query.role ?? null];
  const rows: Row[] = await db.query(
    `SELECT * FROM (${MEMBERS}) AS member WHERE ${filter}
      ORDER BY ${SORTS[query.sort]} ${direction}, id LIMIT $5 OFFSET $6`,
    [...values, query.pageSize, (query.page - 1) * query.pageSize],
  );
  const counted: { total: string }[] = await db.query(
    `SELECT count(*) AS total FROM (${MEMBERS}) AS member WHERE ${filter}`,
    values,
  );
  const sites: MemberList['sites'] = await db.query(
    'SELECT uid AS id, code, name FROM site WHERE study_id = $1 ORDER BY code COLLATE "C"',
    [studyId],
  );
  return { rows: rows.map(view), total: Number(counted[0]?.total ?? 0), sites };
}

/** One person of the study; null where they hold no duty in it. */
export async function memberOf(
  manager: EntityManager,
  studyId: string,
  accountUid: string,
): Promise<MemberView | null> {
  const rows: Row[] = await manager.query(`SELECT * FROM (${MEMBERS}) AS member WHERE uid = $3`, [
    studyId,
    studyRoles,
    accountUid,
  ]);
  return rows[0] ? view(rows[0]) : null;
}

/** How many owners could sign in, this one left out. */
export async function otherOwners(
  manager: EntityManager,
  studyId: string,
  accountUid: string,
): Promise<number> {
  const rows: { count: string }[] = await manager.query(
    `SELECT count(*) FROM membership m JOIN account a ON a.id = m.account_id
      WHERE m.study_id = $1 AND m.role = 'owner' AND m.removed_at IS NULL
        AND a.disabled_at IS NULL AND a.uid <> $2`,
    [studyId, accountUid],
  );
  return Number(rows[0]?.count ?? 0);
}
