/** The studies one person belongs to, with duties, sites and places. */
import type { DataSource } from 'typeorm';
import type { MyMembership } from '../../contracts/auth.ts';
import { studyRoles } from '../../contracts/common.ts';
import { placesOf } from './places.ts';

interface Row {
  id: string;
  name: string;
  short_name: string;
  masked: boolean;
  state: MyMembership['study']['state'];
  roles: MyMembership['roles'];
  chair: boolean;
  sites: MyMembership['sites'];
}

/** @param studyUid only this study */
export async function membershipsOf(
  db: DataSource,
  accountId: string,
  studyUid?: string,
): Promise<MyMembership[]> {
  const rows: Row[] = await db.query(
    `SELECT s.uid AS id, s.name, s.short_name, s.masked, s.state,
            array_agg(DISTINCT m.role) AS roles, bool_or(m.chair) AS chair,
            coalesce(jsonb_agg(DISTINCT jsonb_build_object('id', t.uid, 'code', t.code, 'name', t.name))
              FILTER (WHERE t.id IS NOT NULL), '[]') AS sites
       FROM membership m
       JOIN study s ON s.id = m.study_id
       LEFT JOIN membership_site ms ON ms.membership_id = m.id
       LEFT JOIN site t ON t.id = ms.site_id
      WHERE m.account_id = $1 AND m.removed_at IS NULL AND ($2::uuid IS NULL OR s.uid = $2)
      GROUP BY s.id ORDER BY s.name, s.id`,
    [accountId, studyUid ?? null],
  );
  return rows.map((row) => {
    const roles = studyRoles.filter((role) => row.roles.includes(role));
    return {
      study: {
        id: row.id,
        name: row.name,
        shortName: row.short_name,
        masked: row.masked,
        state: row.state,
      },
      roles,
      chair: row.chair,
      sites: row.sites.sort((a, b) => (a.code < b.code ? -1 : 1)),
      places: placesOf(roles),
    };
  });
}
