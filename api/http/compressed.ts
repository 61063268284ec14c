/** Answers in fewer bytes: the built pages and JSON, by brotli or gzip as the caller likes. */
import compression from 'compression';
import type { RequestHandler } from 'express';

/**
 * Downloads of cuts and lists stay as they are: they stream with the bytes that were hashed. Streams of
 * progress have to arrive event by event, which a compressor would hold back.
 */
const COMPRESSED = /^(application\/(problem\+)?json|text\/(html|javascript|css)|image\/svg\+xml)\b/;

/** Below this a packet is not saved. */
const SMALLEST_BYTES = 1_024;

export function compressed(): RequestHandler {
  return compression({
    threshold: SMALLEST_BYTES,
    filter: (_req, res) => COMPRESSED.test(String(res.getHeader('Content-Type') ?? '')),
  });
}
