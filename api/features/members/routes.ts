/** HTTP of the people of a study; the rules are in the service beside it. */
import {
  addMemberRequestSchema,
  changeMemberRequestSchema,
  memberListQuerySchema,
  memberListSchema,
  memberSchema,
  removeMemberRequestSchema,
} from '../../contracts/members.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';
import { listMembers } from './member-repository.ts';
import { mayManageMembers } from './policy.ts';
import { addMember, changeMember, removeMember } from './service.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/studies/:study/members',
    summary: 'The people of a study with their duties',
    access: mayManageMembers,
    query: memberListQuerySchema,
    answer: memberListSchema,
    handler: ({ db, membership, query }) => listMembers(db, membership.studyId, query),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/members',
    summary: 'Add a person who has an account',
    access: mayManageMembers,
    body: addMemberRequestSchema,
    status: 201,
    answer: memberSchema,
    handler: (context) => addMember(context, context.body),
  }),
  defineRoute({
    method: 'patch',
    path: '/api/studies/:study/members/:member',
    summary: 'Give a person other duties or sites',
    access: mayManageMembers,
    body: changeMemberRequestSchema,
    answer: memberSchema,
    handler: (context) => changeMember(context, context.params.member, context.body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/studies/:study/members/:member/remove',
    summary: 'Take a person out of the study; what they did stays',
    access: mayManageMembers,
    body: removeMemberRequestSchema,
    answer: null,
    handler: (context) => removeMember(context, context.params.member, context.body),
  }),
];
