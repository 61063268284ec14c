import { setupViewSchema } from '../../contracts/setup.ts';
import { defineRoute } from '../../http/route.ts';
import { readSetup } from './service.ts';

export const routes = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/setup',
    summary: 'The set-up of a study: sites, arms by name, measures and the visit schedule.',
    access: { study: ['owner'] },
    answer: setupViewSchema,
    handler: ({ db, membership }) => readSetup(db.manager, membership.studyId),
  }),
];
