/** Who may read the figures about the process: this machine itself, or whoever holds the token. */
import { createHash, timingSafeEqual } from 'node:crypto';
import type { Request } from 'express';
import { type Config, isLoopback } from '../../config.ts';

type Asked = Pick<Request, 'headers' | 'socket'>;

/**
 * Behind a proxy of the same machine every visitor seems to come from here. So the way without a token is
 * open only where people, too, reach this installation by an address of loopback.
 */
export function mayReadMetrics(
  config: Pick<Config, 'publicUrl' | 'metricsToken'>,
  req: Asked,
): boolean {
  const token = /^Bearer (.+)$/i.exec(req.headers.authorization ?? '')?.[1];
  if (token !== undefined && config.metricsToken !== undefined) {
    return timingSafeEqual(digest(token), digest(config.metricsToken));
  }
  const forwarded = req.headers['x-forwarded-for'] ?? req.headers.forwarded;
  return (
    forwarded === undefined &&
    isLoopback(req.socket.remoteAddress ?? '') &&
    isLoopback(new URL(config.publicUrl).hostname)
  );
}

/** Of one length whatever was sent, so that the comparison takes one time. */
function digest(text: string): Buffer {
  return createHash('sha256').update(text).digest();
}
