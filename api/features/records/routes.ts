/** HTTP of analysis records; the rules are in the files beside it. */
import { confirmPassword } from '../../auth/confirm-password.ts';
import {
  recordDetailSchema,
  recordListQuerySchema,
  recordListSchema,
  signRecordRequestSchema,
} from '../../contracts/analysis.ts';
import { sendFile } from '../../http/files.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import { ANALYSTS, READERS } from '../cuts/policy.ts';
import { scopeOf } from '../cuts/scope.ts';
import { fileOf, recordDetail, recordOf, recordPage } from './service.ts';
import { signRecord } from './sign-record.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/records',
    summary: 'The analysis records of a study, newest first unless sorted otherwise.',
    access: { study: READERS },
    query: recordListQuerySchema,
    answer: recordListSchema,
    handler: async (context) => recordPage(scopeOf(context), context.query),
  }),
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/records/:record',
    summary: 'One record with its check, result, picture and signatures.',
    access: { study: READERS },
    answer: recordDetailSchema,
    handler: async (context) => recordDetail(scopeOf(context), context.params.record),
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/studies/:study/records/:record/file',
    summary: 'The record as JSON, stamped where an ordinary fit was opened.',
    access: { study: READERS },
    produces: 'application/json',
    handler: async (context) => {
      const { name, text } = await fileOf(scopeOf(context), context.params.record);
      await sendFile(context.res, {
        name,
        type: 'application/json; charset=utf-8',
        content: Buffer.from(text, 'utf8'),
        headers: { 'Cache-Control': 'private, no-store' },
      });
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/records/:record/signatures',
    summary: 'Signs a record: password again, meaning, and the hash of what was read.',
    access: { study: ANALYSTS },
    body: signRecordRequestSchema,
    status: 201,
    answer: recordDetailSchema,
    handler: async (context) => {
      const scope = scopeOf(context);
      const record = await recordOf(scope, context.params.record);
      await confirmPassword(context.deps, context.person, context.actor, context.body.password);
      await signRecord(scope, record, context.body);
      return recordDetail(scope, record.uid);
    },
  }),
];
