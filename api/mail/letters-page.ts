import { type RequestHandler, Router } from 'express';
import { isLoopback } from '../config.ts';
import { lettersWords } from '../words/letters.ts';
import type { MailSink, SunkLetter } from './sink.ts';

/** The demo's letters at /demo/letters, for callers on this machine only; elsewhere the page does not exist. */
export function lettersPage(sink: MailSink): Router {
  const router = Router();
  router.use(onlyFromHere);
  router.get('/', async (_request, response) => {
    const letters = await sink.letters();
    response
      .set({
        'Content-Type': 'text/html; charset=utf-8',
        'Content-Security-Policy':
          "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'none'",
        'Cache-Control': 'no-store',
        'X-Content-Type-Options': 'nosniff',
      })
      .send(page(letters));
  });
  return router;
}

/** Both ends must be this machine: the socket, and the name the browser asked for (against rebinding of names). */
const onlyFromHere: RequestHandler = (request, response, next) => {
  const socket = request.socket.remoteAddress ?? '';
  const forwarded = request.headers['x-forwarded-for'] !== undefined;
  const asked = URL.canParse(`http://${request.headers.host}`)
    ? new URL(`http://${request.headers.host}`).hostname
    : '';
  if (isLoopback(socket) && isLoopback(asked) && !forwarded) next();
  else response.status(404).end();
};

function page(letters: readonly SunkLetter[]): string {
  const items = letters.map(
    (letter) => `<article>
<h2>${escapeHtml(letter.subject)}</h2>
<p>${escapeHtml(lettersWords.meta(letter.to, letter.at))}</p>
<pre>${escapeHtml(letter.text)}</pre>
</article>`,
  );
  return `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<title>${escapeHtml(lettersWords.title)}</title>
<style>
:root { color-scheme: light dark; font: 1rem/1.5 system-ui, sans-serif; }
main { max-width: 44rem; margin: 2rem auto; padding: 0 1rem; }
article { border-top: 1px solid; padding: 1rem 0; }
h2 { font-size: 1.125rem; margin: 0; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; }
</style>
<main>
<h1>${escapeHtml(lettersWords.title)}</h1>
<p>${escapeHtml(letters.length === 0 ? lettersWords.none : lettersWords.lead)}</p>
${items.join('\n')}
</main>
</html>
`;
}

function escapeHtml(text: string): string {
  return text
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;');
}
