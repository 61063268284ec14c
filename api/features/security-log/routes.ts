/** HTTP of the security log. */
import {
  securityLogFilterSchema,
  securityLogQuerySchema,
  securityLogSchema,
} from '../../contracts/accounts.ts';
import { sendFile } from '../../http/files.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import { securityLogWords } from '../../words/security-log.ts';
import { logAsCsv, readLog } from './service.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/security-log',
    summary: 'Sign-ins, refusals and what was done to accounts',
    access: 'administrator',
    query: securityLogQuerySchema,
    answer: securityLogSchema,
    handler: ({ db, query }) => readLog(db, query),
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/security-log.csv',
    summary: 'The same entries as a file',
    access: 'administrator',
    query: securityLogFilterSchema,
    produces: 'text/csv',
    handler: ({ db, query, deps, res }) =>
      sendFile(res, {
        name: securityLogWords.fileName(deps.clock().toISOString().slice(0, 10)),
        type: 'text/csv; charset=utf-8',
        content: logAsCsv(db, query),
      }),
  }),
];
