/** HTTP of the check, the lock and fits; the rules are in the files beside it. */
import {
  acknowledgementSchema,
  acknowledgeRequestSchema,
  checkSchema,
  openCheckRequestSchema,
  recordDetailSchema,
  runFitRequestSchema,
} from '../../contracts/analysis.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';
import { ANALYSTS } from '../cuts/policy.ts';
import { scopeOf } from '../cuts/scope.ts';
import { recordDetail } from '../records/service.ts';
import { acknowledge } from './acknowledge.ts';
import { openCheck } from './open-check.ts';
import { runFit } from './run-fit.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/cuts/:cut/check',
    summary: 'Opens the independence check of a specification for this person.',
    access: { study: ANALYSTS },
    body: openCheckRequestSchema,
    answer: checkSchema,
    handler: async (context) =>
      openCheck(scopeOf(context), context.params.cut, context.body.specification),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/cuts/:cut/acknowledgements',
    summary: 'Records why an ordinary fit of repeated readings is wanted.',
    access: { study: ANALYSTS },
    idempotent: true,
    body: acknowledgeRequestSchema,
    status: 201,
    answer: acknowledgementSchema,
    handler: async (context) =>
      acknowledge(
        scopeOf(context),
        context.params.cut,
        context.body.specification,
        context.body.reason,
      ),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/cuts/:cut/fits',
    summary: 'Runs a fit and writes its record.',
    access: { study: ANALYSTS },
    idempotent: true,
    body: runFitRequestSchema,
    status: 201,
    answer: recordDetailSchema,
    handler: async (context) => {
      const scope = scopeOf(context);
      return recordDetail(scope, await runFit(scope, context.params.cut, context.body));
    },
  }),
];
