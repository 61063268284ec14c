import { randomUUID } from 'node:crypto';
import { mkdir, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { text as readText } from 'node:stream/consumers';
import { type ReadLetter, readLetter } from './read-letter.ts';

export interface SunkLetter extends ReadLetter {
  /** ISO time at which it arrived. */
  at: string;
}

export interface MailSink {
  smtpUrl: string;
  /** Newest first. */
  letters(): Promise<SunkLetter[]>;
  close(): Promise<void>;
}

/** The demo is looked at, not archived: older letters make room. */
const KEPT = 200;
const LARGEST = 1_000_000;

/**
 * A mail server on loopback that delivers nothing and keeps each letter as a file, so that the demo's
 * letters can be read and survive a restart.
 */
export async function startSink(folder: string, now: () => Date): Promise<MailSink> {
  await mkdir(folder, { recursive: true, mode: 0o700 });
  // A development package: the sink only ever runs from a clone, and a lean installation does without.
  const { SMTPServer } = await import('smtp-server');
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: LARGEST,
    logger: false,
    onData(stream, _session, done) {
      readText(stream)
        .then(async (source) => {
          const at = now().toISOString();
          const letter: SunkLetter = { at, ...readLetter(source) };
          const name = `${at.replace(/[:.]/g, '-')}-${randomUUID()}.json`;
          await writeFile(join(folder, name), JSON.stringify(letter), { mode: 0o600 });
          await dropOldest(folder);
        })
        .then(
          () => done(),
          (error: Error) => done(error),
        );
    },
  });
  const port = await new Promise<number>((ready, refuse) => {
    server.once('error', refuse);
    const listener = server.listen(0, '127.0.0.1', () => {
      const address = listener.address();
      listener.unref();
      if (address === null || typeof address === 'string') refuse(new Error('no port'));
      else ready(address.port);
    });
  });
  // A client that hangs up mid-letter must not end the process.
  server.on('error', () => undefined);
  return {
    smtpUrl: `smtp://127.0.0.1:${port}`,
    async letters() {
      const names = await letterFiles(folder);
      const texts = await Promise.all(
        names.reverse().map((name) => readFile(join(folder, name), 'utf8')),
      );
      return texts.map((text) => JSON.parse(text) as SunkLetter);
    },
    close: () => new Promise((closed) => server.close(() => closed())),
  };
}

/** Names begin with the time, so their order is the order of arrival. */
async function letterFiles(folder: string): Promise<string[]> {
  return (await readdir(folder)).filter((name) => name.endsWith('.json')).sort();
}

async function dropOldest(folder: string): Promise<void> {
  const names = await letterFiles(folder);
  const surplus = names.slice(0, Math.max(0, names.length - KEPT));
  await Promise.all(surplus.map((name) => rm(join(folder, name), { force: true })));
}
