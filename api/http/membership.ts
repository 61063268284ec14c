/** What a person is in one study: the duties, and the sites of a coordinator. */
import type { DataSource } from 'typeorm';
import type { StudyRole } from '../contracts/common.ts';

export interface StudyMembership {
  /** Inner key of the study. */
  studyId: string;
  studyUid: string;
  studyName: string;
  masked: boolean;
  studyState: 'open' | 'locked' | 'closed';
  roles: StudyRole[];
  chair: boolean;
  /** Inner keys of a coordinator's sites. */
  siteIds: string[];
}

interface Row {
  study_id: string;
  study_uid: string;
  name: string;
  masked: boolean;
  state: StudyMembership['studyState'];
  roles: StudyRole[];
  chair: boolean;
  site_ids: string[];
}

/** Null for a study that does not exist as well as for one this person does not belong to. */
export async function membershipOf(
  db: DataSource,
  accountId: string,
  studyUid: string,
): Promise<StudyMembership | null> {
  const rows: Row[] = await db.query(
    `SELECT s.id AS study_id, s.uid AS study_uid, s.name, s.masked, s.state,
            array_agg(DISTINCT m.role) AS roles, bool_or(m.chair) AS chair,
            coalesce(array_agg(DISTINCT ms.site_id::text) FILTER (WHERE ms.site_id IS NOT NULL), '{}') AS site_ids
       FROM membership m
       JOIN study s ON s.id = m.study_id
       LEFT JOIN membership_site ms ON ms.membership_id = m.id
      WHERE m.account_id = $1 AND m.removed_at IS NULL AND s.uid = $2
      GROUP BY s.id`,
    [accountId, studyUid],
  );
  const row = rows[0];
  if (!row) return null;
  return {
    studyId: row.study_id,
    studyUid: row.study_uid,
    studyName: row.name,
    masked: row.masked,
    studyState: row.state,
    roles: row.roles,
    chair: row.chair,
    siteIds: row.site_ids,
  };
}
