/** The study as its members see it: name, own duties, sites, places. */
import { myMembershipSchema } from '../../contracts/auth.ts';
import { studyRoles } from '../../contracts/common.ts';
import { Problem } from '../../http/problems.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';
import { membershipsOf } from '../session/memberships.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study',
    summary: 'One study with the own duties in it',
    access: { study: studyRoles },
    answer: myMembershipSchema,
    handler: async ({ deps, person, params }) => {
      const [own] = await membershipsOf(deps.databases.masked, person.accountId, params.study);
      if (!own) throw new Problem('not_found');
      return own;
    },
  }),
];
