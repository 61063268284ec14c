/** Runs a declared route: who may, then what comes in, then the handler, then what goes out. */
import type { NextFunction, Request, Response, Router } from 'express';
import { grantAccess } from './access.ts';
import { checkAgainst, checkBody, checkParams } from './check-input.ts';
import type { AppDeps } from './deps.ts';
import {
  giveKeyBack,
  type HeldKey,
  idempotencyKeyOf,
  keepAnswer,
  requestHash,
  takeKey,
} from './idempotency.ts';
import { Problem } from './problems.ts';
import { requestIdOf } from './request-facts.ts';
import type { AnyContext, RouteDefinition } from './route.ts';

/** Marks a session as used by a person; given by the sign-in, which this file does not know. */
export type Touch = (sessionId: string, lastSeenAt: Date) => Promise<void>;

export function serveRoutes(
  router: Router,
  routes: readonly RouteDefinition[],
  deps: AppDeps,
  touch: Touch,
): void {
  for (const route of routes) {
    router[route.method](route.path, (req: Request, res: Response, next: NextFunction) => {
      serve(route, deps, touch, req, res).catch(next);
    });
  }
}

async function serve(
  route: RouteDefinition,
  deps: AppDeps,
  touch: Touch,
  req: Request,
  res: Response,
): Promise<void> {
  const params = checkParams(req.params);
  const granted = await grantAccess(route, deps.databases, res, params.study);
  if (granted && !route.background) {
    await touch(granted.person.sessionId, granted.person.lastSeenAt);
  }
  const context: AnyContext = {
    params,
    query: route.query ? checkAgainst(route.query, req.query) : undefined,
    body: route.body ? checkBody(route.body, req) : undefined,
    deps,
    requestId: requestIdOf(res),
    req,
    res,
    ...granted,
  };
  if (route.produces) {
    await route.handler(context);
    return;
  }
  const key = route.idempotent && granted ? idempotencyKeyOf(req) : null;
  if (key === null || !granted) {
    send(res, route.status, answerText(route, await route.handler(context)));
    return;
  }
  const held = { accountId: granted.person.accountId, key, route: `${route.method} ${route.path}` };
  await serveOnce(route, deps, context, held);
}

async function serveOnce(
  route: RouteDefinition,
  deps: AppDeps,
  context: AnyContext,
  held: HeldKey,
): Promise<void> {
  const db = deps.databases.masked;
  const before = await takeKey(db, held, requestHash(context.req), deps.clock);
  if (before) {
    if (route.sealed) throw new Problem('already_done');
    context.res.set('Idempotent-Replay', 'true');
    send(context.res, before.status, before.body);
    return;
  }
  let body: string | null;
  try {
    body = answerText(route, await route.handler(context));
  } catch (error) {
    await giveKeyBack(db, held);
    throw error;
  }
  await keepAnswer(db, held, { status: route.status, body: route.sealed ? null : body });
  send(context.res, route.status, body);
}

/** The contract decides what leaves: fields it does not name are dropped, a breach is our own fault. */
function answerText(route: RouteDefinition, answer: unknown): string | null {
  if (!route.answer) return null;
  const read = route.answer.safeParse(answer);
  if (read.success) return JSON.stringify(read.data);
  const places = read.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.code}`);
  throw new Error(`the answer of ${route.method} ${route.path} breaks its contract: ${places}`);
}

function send(res: Response, status: number, body: string | null): void {
  if (body === null) res.status(status).end();
  else res.status(status).type('application/json').send(body);
}
