/** A letter as the sink shows it. */
export interface ReadLetter {
  to: string;
  kind: string;
  subject: string;
  text: string;
}

/**
 * Reads a message as our own mailer writes it: one part of plain text, in base64, quoted-printable or as it
 * stands. Any other structure is shown as its source.
 */
export function readLetter(source: string): ReadLetter {
  const [head = '', ...rest] = source.replace(/\r\n/g, '\n').split('\n\n');
  const body = rest.join('\n\n');
  const unfolded = head.replace(/\n[ \t]+/g, ' ').split('\n');
  const header = (name: string) => {
    const line = unfolded.find((text) => text.toLowerCase().startsWith(`${name}:`));
    return decodeWords(line?.slice(name.length + 1).trim() ?? '');
  };
  return {
    to: header('to'),
    kind: header('x-letter-kind'),
    subject: header('subject'),
    text: decodeBody(body, header('content-transfer-encoding').toLowerCase()).trim(),
  };
}

function decodeBody(body: string, encoding: string): string {
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString('utf8');
  if (encoding === 'quoted-printable') return decodeQuoted(body.replace(/=\n/g, ''));
  return body;
}

function decodeQuoted(text: string): string {
  const bytes = text.replace(/=([0-9A-F]{2})/gi, (_, hex: string) =>
    String.fromCharCode(Number.parseInt(hex, 16)),
  );
  return Buffer.from(bytes, 'latin1').toString('utf8');
}

/** Encoded words of RFC 2047, which stand in headers for letters beyond ASCII. */
function decodeWords(text: string): string {
  return text
    .replace(/\?=\s+=\?/g, '?==?')
    .replace(/=\?utf-8\?([bq])\?([^?]*)\?=/gi, (_, kind: string, content: string) =>
      kind.toLowerCase() === 'b'
        ? Buffer.from(content, 'base64').toString('utf8')
        : decodeQuoted(content.replace(/_/g, ' ')),
    );
}
