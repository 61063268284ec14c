/** Figures about the process, for a collector. */
import { Problem } from '../../http/problems.ts';
import { defineFileRoute, type RouteDefinition } from '../../http/route.ts';
import { mayReadMetrics } from './policy.ts';

export const routes: RouteDefinition[] = [
  defineFileRoute({
    method: 'get',
    path: '/metrics',
    summary:
      'Figures about the process as Prometheus text; from loopback, or with METRICS_TOKEN as bearer token',
    access: 'public',
    produces: 'text/plain',
    handler: async ({ deps, req, res }) => {
      if (!mayReadMetrics(deps.config, req)) throw new Problem('metrics_token_needed');
      res.set('Cache-Control', 'no-store');
      res.set('Content-Type', deps.metrics.contentType).end(await deps.metrics.text());
    },
  }),
];
