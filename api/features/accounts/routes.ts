/** HTTP of accounts; the rules are in the service beside it. */
import {
  accountActRequestSchema,
  accountListQuerySchema,
  accountListSchema,
  accountSchema,
  createAccountRequestSchema,
  issuedAccountSchema,
} from '../../contracts/accounts.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';
import { listAccounts } from './account-repository.ts';
import { mayManageAccounts } from './policy.ts';
import { createAccount, disableAccount, enableAccount, resetAccount } from './service.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/accounts',
    summary: 'Accounts of the installation',
    access: mayManageAccounts,
    query: accountListQuerySchema,
    answer: accountListSchema,
    handler: ({ db, query }) => listAccounts(db, query),
  }),
  defineRoute({
    method: 'post',
    path: '/api/accounts',
    summary: 'Make an account; the temporary password is answered this once',
    access: mayManageAccounts,
    body: createAccountRequestSchema,
    status: 201,
    answer: issuedAccountSchema,
    handler: ({ deps, actor, body }) => createAccount(deps, actor, body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/accounts/:account/disable',
    summary: 'Close an account; its sessions end',
    access: mayManageAccounts,
    body: accountActRequestSchema,
    answer: accountSchema,
    handler: ({ deps, actor, params, body }) => disableAccount(deps, actor, params.account, body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/accounts/:account/enable',
    summary: 'Open a closed account again',
    access: mayManageAccounts,
    body: accountActRequestSchema,
    answer: accountSchema,
    handler: ({ deps, actor, params, body }) => enableAccount(deps, actor, params.account, body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/accounts/:account/reset',
    summary: 'Give an account a new temporary password; its sessions end',
    access: mayManageAccounts,
    body: accountActRequestSchema,
    answer: issuedAccountSchema,
    handler: ({ deps, actor, params, body }) => resetAccount(deps, actor, params.account, body),
  }),
];
