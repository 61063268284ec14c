/** Signing in and out, and everything a person sees of their own account. */
import { limitsView } from '../../auth/session-limits.ts';
import { renewSession } from '../../auth/sessions.ts';
import { signIn } from '../../auth/sign-in.ts';
import {
  clearSessionCookies,
  DEVICE_COOKIE,
  REFRESH_COOKIE,
  setDeviceCookie,
  setSessionCookies,
} from '../../auth/tokens.ts';
import {
  changeMeRequestSchema,
  changePasswordRequestSchema,
  meSchema,
  mySessionsSchema,
  signedInSchema,
  signInRequestSchema,
} from '../../contracts/auth.ts';
import { Problem } from '../../http/problems.ts';
import { defineRoute, type RouteDefinition } from '../../http/route.ts';
import { changeMe, changePassword, endSession, me, mySessions } from './service.ts';

export const routes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/sign-in',
    summary: 'Sign in with address and password; the session comes as cookies',
    access: 'public',
    body: signInRequestSchema,
    answer: signedInSchema,
    handler: async ({ body, deps, req, res, requestId }) => {
      const { secureCookies } = deps.config;
      const signed = await signIn(deps, {
        ...body,
        address: req.ip,
        agent: req.get('user-agent'),
        deviceCookie: req.cookies[DEVICE_COOKIE],
        requestId,
      });
      setSessionCookies(res, signed.tokens, secureCookies, deps.clock());
      setDeviceCookie(res, signed.device, secureCookies);
      return {
        ...limitsView(signed.tokens.accessExpiresAt, signed.tokens.absoluteExpiresAt),
        mustChangePassword: signed.mustChangePassword,
      };
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/refresh',
    summary: 'Trade the refresh cookie for new cookies; it works once',
    access: 'public',
    answer: signedInSchema,
    handler: async ({ deps, req, res, requestId }) => {
      const { secureCookies } = deps.config;
      const token: unknown = req.cookies[REFRESH_COOKIE];
      if (typeof token !== 'string') throw new Problem('not_signed_in');
      const now = deps.clock();
      const renewal = await renewSession(
        deps.databases.masked,
        token,
        deps.secrets.jwtKey,
        now,
        requestId,
      );
      if ('ended' in renewal) {
        clearSessionCookies(res, secureCookies);
        const why = renewal.ended === 'reused' ? 'signed out' : renewal.ended;
        throw new Problem('session_ended', { why });
      }
      setSessionCookies(res, renewal.tokens, secureCookies, now);
      return {
        ...limitsView(renewal.tokens.accessExpiresAt, renewal.tokens.absoluteExpiresAt),
        mustChangePassword: renewal.mustChangePassword,
      };
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/sign-out',
    summary: 'End this session on the server',
    access: 'signed in',
    withTemporaryPassword: true,
    answer: null,
    handler: async ({ deps, person, actor, res }) => {
      await endSession(deps, person, actor, person.sessionUid);
      clearSessionCookies(res, deps.config.secureCookies);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/me',
    summary: 'Own account, memberships with their places, and when this session ends',
    access: 'signed in',
    withTemporaryPassword: true,
    answer: meSchema,
    handler: ({ deps, person }) => me(deps, person),
  }),
  defineRoute({
    method: 'patch',
    path: '/api/me',
    summary: 'Change own theme or time zone',
    access: 'signed in',
    body: changeMeRequestSchema,
    answer: meSchema,
    handler: ({ deps, person, actor, body }) => changeMe(deps, person, actor, body),
  }),
  defineRoute({
    method: 'post',
    path: '/api/me/password',
    summary: 'Change own password; ends every other session',
    access: 'signed in',
    withTemporaryPassword: true,
    body: changePasswordRequestSchema,
    answer: null,
    handler: ({ deps, person, actor, body }) => changePassword(deps, person, actor, body),
  }),
  defineRoute({
    method: 'get',
    path: '/api/me/sessions',
    summary: 'Own sessions that could still be used',
    access: 'signed in',
    answer: mySessionsSchema,
    handler: ({ deps, person }) => mySessions(deps, person),
  }),
  defineRoute({
    method: 'delete',
    path: '/api/me/sessions/:session',
    summary: 'End one of the own sessions',
    access: 'signed in',
    answer: null,
    handler: ({ deps, person, actor, params }) => endSession(deps, person, actor, params.session),
  }),
];
