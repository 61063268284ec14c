/** Refuses changes that another site asks for in the person's name, beside the SameSite cookie. */
import type { RequestHandler } from 'express';
import type { Config } from '../config.ts';
import { Problem } from './problems.ts';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

export function originCheck(config: Pick<Config, 'publicUrl'>): RequestHandler {
  const own = new URL(config.publicUrl).origin;
  return (req, _res, next) => {
    if (SAFE.has(req.method)) {
      next();
      return;
    }
    const origin = req.get('origin');
    const site = req.get('sec-fetch-site');
    // Browsers name the origin of every change; a script of one's own names neither and holds no cookie of a browser.
    const ours =
      origin === undefined
        ? site === undefined || site === 'same-origin' || site === 'none'
        : origin === own || origin === `${req.protocol}://${req.get('host')}`;
    next(ours ? undefined : new Problem('origin_refused'));
  };
}
