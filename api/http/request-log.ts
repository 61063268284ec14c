/** One line a request: method, path without its query string, status and time. No address, cookie or body. */
import type { RequestHandler, Response } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { requestIdOf } from './request-facts.ts';

export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_req, res) => requestIdOf(res as Response),
    serializers: {
      req: (req: { id: string; method: string; url: string }) => ({
        id: req.id,
        method: req.method,
        path: req.url.split('?', 1)[0],
      }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
      // The error handler logs what went wrong, without the values that an error may quote.
      err: () => undefined,
    },
    customLogLevel: (_req, res) => (res.statusCode >= 500 ? 'warn' : 'info'),
    autoLogging: { ignore: (req) => req.url === '/healthz' || req.url === '/readyz' },
  });
}
