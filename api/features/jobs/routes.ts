/** Long work as a person follows it: state, news as they come, and a way to stop it. */
import { jobSchema } from '../../contracts/jobs.ts';
import { defineFileRoute, defineRoute, type RouteDefinition } from '../../http/route.ts';
import { cancelJob, ownJob } from './service.ts';
import { streamJob } from './stream.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/jobs/:job',
    summary: 'How far a piece of work has come that the caller started',
    access: 'signed in',
    background: true,
    answer: jobSchema,
    handler: ({ deps, person, params }) => ownJob(deps, person, params.job),
  }),
  defineFileRoute({
    method: 'get',
    path: '/api/jobs/:job/events',
    summary: 'The same as server-sent events, one at each change, until the work ends',
    access: 'signed in',
    background: true,
    produces: 'text/event-stream',
    handler: ({ deps, person, params, req, res }) => streamJob(deps, person, params.job, req, res),
  }),
  defineRoute({
    method: 'post',
    path: '/api/jobs/:job/cancel',
    summary: 'Ask a piece of work to stop; it stops at its next step and keeps nothing',
    access: 'signed in',
    answer: jobSchema,
    handler: ({ deps, person, actor, params }) => cancelJob(deps, person, actor, params.job),
  }),
];
