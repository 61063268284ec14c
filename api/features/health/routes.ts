/** Whether the process lives, and whether it can do its work. */
import { z } from 'zod';
import { Problem } from '../../http/problems.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';

const aliveSchema = z.object({ status: z.literal('ok') });

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/healthz',
    summary: 'The process answers',
    access: 'public',
    answer: aliveSchema,
    handler: async () => ({ status: 'ok' as const }),
  }),
  defineRoute({
    method: 'get',
    path: '/readyz',
    summary: 'Database and object storage can be reached',
    access: 'public',
    answer: aliveSchema,
    handler: async ({ deps, requestId }) => {
      const checks = await Promise.allSettled([
        deps.databases.masked.query('SELECT 1'),
        deps.store.check(),
      ]);
      if (checks.some((check) => check.status === 'rejected')) {
        deps.logger.warn({ requestId }, 'not ready');
        throw new Problem('not_ready', {}, { retryAfter: 2 });
      }
      return { status: 'ok' as const };
    },
  }),
];
