/** Puts the application together, in the order in which a request passes through it. */
import { randomUUID } from 'node:crypto';
import { join, sep } from 'node:path';
import cookieParser from 'cookie-parser';
import express, { type Express, type RequestHandler } from 'express';
import { signInGuard } from './auth/guard.ts';
import { touchSession } from './auth/sessions.ts';
import { featureRoutes } from './features/index.ts';
import { compressed } from './http/compressed.ts';
import type { AppDeps } from './http/deps.ts';
import { errorHandler } from './http/error-handler.ts';
import { originCheck } from './http/origin-check.ts';
import { Problem } from './http/problems.ts';
import { setRequestId } from './http/request-facts.ts';
import { requestLog } from './http/request-log.ts';
import type { RouteDefinition } from './http/route.ts';
import { securityHeaders } from './http/security-headers.ts';
import { serveRoutes } from './http/serve-route.ts';

export type { AppDeps } from './http/deps.ts';

/** Files come by their own routes; what comes as JSON is forms. */
const JSON_LIMIT = '1mb';

export function createApp(
  deps: AppDeps,
  routes: readonly RouteDefinition[] = featureRoutes,
): Express {
  const app = express();
  app.disable('x-powered-by');
  // One spelling an address: the sign-in judges the same path that the router matches.
  app.enable('case sensitive routing');
  app.enable('strict routing');
  app.set('trust proxy', deps.config.trustedProxies);
  app.set('etag', false);

  app.use(numberRequest);
  app.use(requestLog(deps.logger));
  app.use(deps.metrics.observe);
  app.use(securityHeaders(deps.config.secureCookies));
  app.use(compressed());
  app.use(underApi(neverStored));
  app.use(cookieParser());
  // Nobody learns what stands under /api, or whether it stands there, without a session.
  app.use(underApi(signInGuard(deps, publicAddresses(routes))));
  app.use(underApi(originCheck(deps.config)));
  app.use(underApi(express.json({ limit: JSON_LIMIT })));
  serveRoutes(app, routes, deps, (sessionId, lastSeenAt) =>
    touchSession(deps.databases.masked, sessionId, lastSeenAt, deps.clock()),
  );
  app.use(underApi((_req, _res, next) => next(new Problem('not_found'))));
  if (deps.webRoot) servePages(app, deps.webRoot);
  app.use((_req, _res, next) => next(new Problem('not_found')));
  app.use(errorHandler(deps.logger));
  return app;
}

const numberRequest: RequestHandler = (_req, res, next) => {
  const requestId = randomUUID();
  setRequestId(res, requestId);
  res.set('X-Request-Id', requestId);
  next();
};

const neverStored: RequestHandler = (_req, res, next) => {
  res.set('Cache-Control', 'no-store');
  next();
};

/** Whatever the letters of `/api` are spelled like: what is not a page of ours is not open. */
function underApi(handler: RequestHandler): RequestHandler {
  return (req, res, next) => {
    if (/^\/api(\/|$)/i.test(req.path)) handler(req, res, next);
    else next();
  };
}

function publicAddresses(routes: readonly RouteDefinition[]) {
  const open = new Set(
    routes
      .filter((route) => route.access === 'public')
      .map((route) => `${route.method.toUpperCase()} ${route.path}`),
  );
  return (method: string, path: string): boolean =>
    open.has(`${method === 'HEAD' ? 'GET' : method} ${path}`);
}

/** The built pages; an address that names no file is one of the pages' own. */
function servePages(app: Express, webRoot: string): void {
  app.use(
    express.static(webRoot, {
      index: false,
      redirect: false,
      setHeaders: (res, path) => {
        // The names of built parts hold a hash of their content.
        const hashed = path.startsWith(join(webRoot, 'assets') + sep);
        res.set('Cache-Control', hashed ? 'public, max-age=31536000, immutable' : 'no-cache');
      },
    }),
  );
  app.get('/{*path}', (req, res, next) => {
    if (!req.accepts('html') || /\.\w+$/.test(req.path)) {
      next();
      return;
    }
    res.set('Cache-Control', 'no-cache');
    res.sendFile(join(webRoot, 'index.html'), (error) => {
      if (error) next(error);
    });
  });
}
