/** Imports over HTTP; each coordinator sees their own. */
import {
  applyImportRequestSchema,
  checkImportRequestSchema,
  implausibleRowsSchema,
  importChoicesSchema,
  importListQuerySchema,
  importListSchema,
  importRowsQuerySchema,
  importSchema,
  refusedRowsSchema,
  uploadFieldsSchema,
} from '../../contracts/imports.ts';
import { sendFile } from '../../http/files.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import {
  importChoices,
  listImplausible,
  listImports,
  listRefusals,
  refusalLines,
} from './listing.ts';
import { mayImport } from './policy.ts';
import { importOf, importView } from './rows.ts';
import {
  applyImport,
  cancelImport,
  checkImport,
  type ImportContext,
  uploadImport,
} from './service.ts';
import { withUpload } from './upload.ts';

const scope = ({ actor, membership }: Pick<ImportContext, 'actor' | 'membership'>) => ({
  studyId: membership.studyId,
  accountId: actor.accountId,
});

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/imports/choices',
    summary: 'Measures, sites and visits that the import page offers',
    access: mayImport,
    answer: importChoicesSchema,
    handler: ({ db, membership }) => importChoices(db, membership),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/imports',
    summary: 'Own imports',
    access: mayImport,
    query: importListQuerySchema,
    answer: importListSchema,
    handler: (context) => listImports(context.db, scope(context), context.query),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/imports',
    summary: 'Upload a file of readings of one measure',
    access: mayImport,
    form: uploadFieldsSchema,
    status: 201,
    answer: importSchema,
    handler: (context) =>
      withUpload(context.req, context.res, (upload) => uploadImport(context, upload)),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/imports/:import',
    summary: 'One import',
    access: mayImport,
    answer: importSchema,
    handler: async (context) =>
      importView(await importOf(context.db.manager, scope(context), context.params.import)),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/imports/:import/check',
    summary: 'Keep the mapping and start the dry run',
    access: mayImport,
    body: checkImportRequestSchema,
    idempotent: true,
    status: 202,
    answer: importSchema,
    handler: (context) => checkImport(context, context.params.import, context.body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/imports/:import/apply',
    summary: 'Write the rows that the dry run found new',
    access: mayImport,
    body: applyImportRequestSchema,
    idempotent: true,
    status: 202,
    answer: importSchema,
    handler: (context) => applyImport(context, context.params.import, context.body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/imports/:import/cancel',
    summary: 'End an import that has not been applied',
    access: mayImport,
    answer: importSchema,
    handler: (context) => cancelImport(context, context.params.import),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/imports/:import/refusals',
    summary: 'Refused rows with line and reason',
    access: mayImport,
    query: importRowsQuerySchema,
    answer: refusedRowsSchema,
    handler: async (context) => {
      const row = await importOf(context.db.manager, scope(context), context.params.import);
      return listRefusals(context.db, row.id, context.query);
    },
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/studies/:study/imports/:import/refusals.csv',
    summary: 'Refused rows as a file',
    access: mayImport,
    produces: 'text/csv',
    handler: async (context) => {
      const row = await importOf(context.db.manager, scope(context), context.params.import);
      await sendFile(context.res, {
        name: `${row.file_name.replace(/\.[^.]*$/, '')} refused rows.csv`,
        type: 'text/csv; charset=utf-8',
        content: refusalLines(context.db, row.id),
      });
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/imports/:import/implausible',
    summary: 'New rows outside the plausible range',
    access: mayImport,
    query: importRowsQuerySchema,
    answer: implausibleRowsSchema,
    handler: async (context) => {
      const row = await importOf(context.db.manager, scope(context), context.params.import);
      return listImplausible(context.db, row, context.query);
    },
  }),
];
