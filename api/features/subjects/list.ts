/** The list of subjects: filtered, sorted, paged; each row with its cord. */
import type { EntityManager } from 'typeorm';
import type {
  FoundSubjects,
  SubjectFileQuery,
  SubjectList,
  SubjectListQuery,
  SubjectRow,
  SubjectState,
} from '../../contracts/subjects.ts';
import { dayInZone } from '../cuts/days.ts';
import { buildCord, cordView, countVisits } from './cord.ts';
import { readLoggedVisits, readStudyPlan, type StudyPlan } from './cord-source.ts';

export interface SubjectScope {
  studyId: string;
  /** Sites in reach; null: every site. */
  siteIds: readonly string[] | null;
  now: Date;
}

interface Row {
  id: string;
  uid: string;
  code: string;
  site_code: string;
  site_name: string;
  time_zone: string;
  state: SubjectState;
  state_date: string | null;
  baseline_date: string | null;
  last_visit: string | null;
}

/** One expression a sort key; the inner key makes the order the same on every page. */
const ORDER: Record<SubjectListQuery['sort'], string> = {
  code: 'lower(s.code) COLLATE "C"',
  site: 'lower(site.code) COLLATE "C"',
  state: 's.state',
  baselineDate: 's.baseline_date',
  visitsDone: `(SELECT count(*) FROM visit v
                 WHERE v.subject_id = s.id AND v.planned_visit_id IS NOT NULL AND v.date IS NOT NULL
                   AND EXISTS (SELECT 1 FROM reading r WHERE r.visit_id = v.id AND r.not_done IS NULL))`,
  lastVisit: '(SELECT max(v.date) FROM visit v WHERE v.subject_id = s.id)',
};

const IN_REACH = 's.study_id = $1 AND ($2::bigint[] IS NULL OR s.site_id = ANY($2))';
const FILTER = `${IN_REACH} AND ($3::text IS NULL OR site.code = $3)
  AND ($4::text IS NULL OR s.state = $4)
  AND ($5::text IS NULL OR position(lower($5) IN lower(s.code)) > 0)`;

const filterValues = (scope: SubjectScope, filter: SubjectFileQuery) => [
  scope.studyId,
  scope.siteIds,
  filter.site ?? null,
  filter.state ?? null,
  filter.text || null,
];

export async function listSubjects(
  manager: EntityManager,
  scope: SubjectScope,
  query: SubjectListQuery,
): Promise<SubjectList> {
  const plan = await readStudyPlan(manager, scope.studyId);
  const rows = await readRows(manager, scope, query, query.pageSize, query.page);
  const counts: { total: number; unfiltered: number }[] = await manager.query(
    `SELECT (count(*) FILTER (WHERE ${FILTER}))::int AS total, count(*)::int AS unfiltered
       FROM subject s JOIN site ON site.id = s.site_id WHERE ${IN_REACH}`,
    filterValues(scope, query),
  );
  const sites: { code: string; name: string }[] = await manager.query(
    `SELECT code, name FROM site
      WHERE study_id = $1 AND ($2::bigint[] IS NULL OR id = ANY($2)) ORDER BY lower(code) COLLATE "C"`,
    [scope.studyId, scope.siteIds],
  );
  return {
    rows: await withCords(manager, scope, plan, rows),
    total: counts[0]?.total ?? 0,
    totalUnfiltered: counts[0]?.unfiltered ?? 0,
    sites,
  };
}

const ROWS_PER_PART = 500;

/** All rows of the filter, some hundred at a time, so that the file needs little memory. */
export async function* allSubjects(
  manager: EntityManager,
  scope: SubjectScope,
  query: SubjectFileQuery,
): AsyncGenerator<SubjectRow[]> {
  const plan = await readStudyPlan(manager, scope.studyId);
  for (let page = 1; ; page += 1) {
    const rows = await readRows(manager, scope, query, ROWS_PER_PART, page);
    if (rows.length > 0) {
      yield await withCords(manager, scope, plan, rows);
    }
    if (rows.length < ROWS_PER_PART) {
      return;
    }
  }
}

/** @returns at most ten whose code begins so, the exact one first */
export async function findSubjects(
  manager: EntityManager,
  scope: SubjectScope,
  code: string,
): Promise<FoundSubjects> {
  const rows: { uid: string; code: string; site_code: string; site_name: string }[] =
    await manager.query(
      `SELECT s.uid, s.code, site.code AS site_code, site.name AS site_name
         FROM subject s JOIN site ON site.id = s.site_id
        WHERE ${IN_REACH} AND starts_with(lower(s.code), lower($3))
        ORDER BY s.code <> $3, length(s.code), lower(s.code) COLLATE "C" LIMIT 10`,
      [scope.studyId, scope.siteIds, code],
    );
  return {
    rows: rows.map((row) => ({
      id: row.uid,
      code: row.code,
      site: { code: row.site_code, name: row.site_name },
    })),
  };
}

async function readRows(
  manager: EntityManager,
  scope: SubjectScope,
  query: SubjectFileQuery,
  limit: number,
  page: number,
): Promise<Row[]> {
  const direction = query.direction === 'desc' ? 'DESC NULLS LAST' : 'ASC NULLS LAST';
  return manager.query(
    `SELECT s.id, s.uid, s.code, site.code AS site_code, site.name AS site_name, site.time_zone,
            s.state, s.state_date, s.baseline_date,
            (SELECT max(v.date) FROM visit v WHERE v.subject_id = s.id) AS last_visit
       FROM subject s JOIN site ON site.id = s.site_id
      WHERE ${FILTER}
      ORDER BY ${ORDER[query.sort]} ${direction}, lower(s.code) COLLATE "C", s.id
      LIMIT $6 OFFSET $7`,
    [...filterValues(scope, query), limit, (page - 1) * limit],
  );
}

async function withCords(
  manager: EntityManager,
  scope: SubjectScope,
  plan: StudyPlan,
  rows: readonly Row[],
): Promise<SubjectRow[]> {
  const visits = await readLoggedVisits(
    manager,
    rows.map((row) => row.id),
    plan.measuresAtVisits,
  );
  const today = todayByZone(scope.now);
  return rows.map((row) => {
    const cord = buildCord(
      { state: row.state, stateDate: row.state_date, baselineDate: row.baseline_date },
      plan.planned,
      visits.get(row.id) ?? [],
      today(row.time_zone),
      plan.closingDays,
    );
    return {
      id: row.uid,
      code: row.code,
      site: { code: row.site_code, name: row.site_name },
      state: row.state,
      stateDate: row.state_date,
      baselineDate: row.baseline_date,
      ...countVisits(cord),
      lastVisit: row.last_visit,
      cord: cordView(cord),
    };
  });
}

/** Formatting a day in a zone is dear beside the rest of a row, and a study has few zones. */
function todayByZone(now: Date): (zone: string) => string {
  const days = new Map<string, string>();
  return (zone) => {
    const day = days.get(zone) ?? dayInZone(now, zone);
    days.set(zone, day);
    return day;
  };
}
