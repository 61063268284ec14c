/** Subjects over HTTP: read by coordinators of their sites, by monitors and owners of every site. */
import { inTransaction } from '../../audit/transaction.ts';
import {
  findSubjectQuerySchema,
  foundSubjectsSchema,
  type SubjectRow,
  subjectDetailSchema,
  subjectFileQuerySchema,
  subjectListQuerySchema,
  subjectListSchema,
} from '../../contracts/subjects.ts';
import type { AppDeps } from '../../http/deps.ts';
import { csvLine, sendFile } from '../../http/files.ts';
import type { StudyMembership } from '../../http/membership.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import { readSubject } from './detail.ts';
import { allSubjects, findSubjects, listSubjects, type SubjectScope } from './list.ts';
import { maySeeSubjects, sitesInReach } from './policy.ts';

const scopeOf = (context: { membership: StudyMembership; deps: AppDeps }): SubjectScope => ({
  studyId: context.membership.studyId,
  siteIds: sitesInReach(context.membership),
  now: context.deps.clock(),
});

const FILE_COLUMNS = [
  'subject',
  'site',
  'state',
  'state_date',
  'baseline_date',
  'visits_done',
  'visits_due',
  'last_visit',
];

function fileLine(row: SubjectRow): string {
  return csvLine([
    row.code,
    row.site.code,
    row.state,
    row.stateDate,
    row.baselineDate,
    row.visitsDone,
    row.visitsDue,
    row.lastVisit,
  ]);
}

async function* linesOf(parts: AsyncIterable<SubjectRow[]>): AsyncGenerator<string> {
  yield csvLine(FILE_COLUMNS);
  for await (const rows of parts) {
    yield rows.map(fileLine).join('');
  }
}

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/subjects',
    summary: 'Subjects in reach, each with its cord',
    access: maySeeSubjects,
    query: subjectListQuerySchema,
    answer: subjectListSchema,
    handler: (context) => listSubjects(context.db.manager, scopeOf(context), context.query),
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/studies/:study/subjects.csv',
    summary: 'The same list as a file, every row of the filter',
    access: maySeeSubjects,
    query: subjectFileQuerySchema,
    produces: 'text/csv',
    handler: async (context) => {
      const { actor, db, membership, query, res } = context;
      const scope = scopeOf(context);
      await inTransaction(db, actor, async (tx) => {
        tx.audit({
          at: scope.now,
          studyUid: membership.studyUid,
          action: 'subject list downloaded',
          entity: 'study',
          entityUid: membership.studyUid,
          after: query,
        });
      });
      await sendFile(res, {
        name: `${membership.studyName} subjects.csv`,
        type: 'text/csv; charset=utf-8',
        content: linesOf(allSubjects(db.manager, scope, query)),
      });
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/subjects/:subject',
    summary: 'One subject with its visits, readings, revisions and where they came from',
    access: maySeeSubjects,
    answer: subjectDetailSchema,
    handler: (context) => readSubject(context.db.manager, scopeOf(context), context.params.subject),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/find',
    summary: 'Subjects whose code begins so',
    access: maySeeSubjects,
    query: findSubjectQuerySchema,
    answer: foundSubjectsSchema,
    handler: (context) => findSubjects(context.db.manager, scopeOf(context), context.query.code),
  }),
];
