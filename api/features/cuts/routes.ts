/** HTTP of cuts; the rules are in the services beside it. */
import { z } from 'zod';
import { uidSchema } from '../../contracts/common.ts';
import {
  cutChoicesSchema,
  cutDetailSchema,
  cutDifferenceSchema,
  cutListQuerySchema,
  cutListSchema,
  cutPreviewQuerySchema,
  cutPreviewSchema,
  freezeCutRequestSchema,
} from '../../contracts/cuts.ts';
import { sendFile } from '../../http/files.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import { chunksOfCut } from './cut-bytes.ts';
import { listCuts } from './cut-repository.ts';
import { freezeCut } from './freeze-cut.ts';
import { ANALYSTS, READERS } from './policy.ts';
import { scopeOf } from './scope.ts';
import {
  cutChoices,
  cutDetail,
  cutDifference,
  cutOf,
  noteDownload,
  previewCut,
} from './service.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/cuts',
    summary: 'The cuts of a study, newest first unless sorted otherwise.',
    access: { study: READERS },
    query: cutListQuerySchema,
    answer: cutListSchema,
    handler: async (context) =>
      listCuts(context.db.manager, context.membership.studyId, context.query),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/cut-choices',
    summary: 'What the form for freezing a cut offers.',
    access: { study: ANALYSTS },
    answer: cutChoicesSchema,
    handler: async (context) => cutChoices(scopeOf(context)),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/cut-preview',
    summary: 'What a cut frozen now would hold.',
    access: { study: ANALYSTS },
    query: cutPreviewQuerySchema,
    answer: cutPreviewSchema,
    handler: async (context) => previewCut(scopeOf(context), context.query),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/cuts',
    summary: 'Freezes a cut: immutable and hashed.',
    access: { study: ANALYSTS },
    idempotent: true,
    body: freezeCutRequestSchema,
    status: 201,
    answer: cutDetailSchema,
    handler: async (context) => {
      const scope = scopeOf(context);
      return cutDetail(scope, await freezeCut(scope, context.body));
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/cuts/:cut',
    summary: 'One cut with its late and pending rows and its difference to the cut before.',
    access: { study: READERS },
    answer: cutDetailSchema,
    handler: async (context) => cutDetail(scopeOf(context), context.params.cut),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/cuts/:cut/difference',
    summary: 'Rows added, changed and gone against another cut of the study.',
    access: { study: READERS },
    query: z.object({ against: uidSchema }),
    answer: cutDifferenceSchema,
    handler: async (context) =>
      cutDifference(scopeOf(context), context.params.cut, context.query.against),
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/studies/:study/cuts/:cut/file',
    summary: 'The canonical CSV of a cut; its SHA-256 is the number shown.',
    access: { study: READERS },
    produces: 'text/csv',
    handler: async (context) => {
      const scope = scopeOf(context);
      const cut = await cutOf(scope, context.params.cut);
      await noteDownload(scope, cut);
      await sendFile(context.res, {
        name: `cut-${cut.number}.csv`,
        type: 'text/csv; charset=utf-8',
        content: chunksOfCut(context.db.manager, cut.id),
        headers: { 'Cache-Control': 'private, no-store' },
      });
    },
  }),
];
