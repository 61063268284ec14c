/** The server's side of the parsing threads: its own loop only passes pieces of text on. */
import { MessageChannel, type MessagePort } from 'node:worker_threads';
import { Piscina } from 'piscina';
import type { ImportMapping } from '../contracts/imports.ts';
import { FileProblem, type FileProblemCode, type Params } from './file-problem.ts';
import type { Inspection } from './inspect-file.ts';
import type { MeasureForm } from './read-value.ts';
import type { Delimiter } from './rows-of.ts';

export interface InspectTask {
  path: string;
  secretNames: string[];
}

export interface RowsTask {
  path: string;
  delimiter: Delimiter;
  mapping: ImportMapping;
  measure: MeasureForm & { per: 'visit' | 'subject' };
}

/** A file problem comes back as data: an error class does not survive the way between threads. */
export type Outcome<T> =
  | { ok: true; value: T }
  | { ok: false; code: FileProblemCode; params: Params };
export type Piece = { text: string; rows: number };

export interface ImportThreads {
  /** @throws FileProblem */
  inspect(task: InspectTask): Promise<Inspection>;
  /** Pieces of COPY text; a slow taker holds the thread back. @throws FileProblem */
  pieces(task: RowsTask): AsyncGenerator<Piece>;
  close(): Promise<void>;
}

/**
 * Starts no thread before the first file and lets idle ones go after a minute.
 *
 * @param onError told of what happens outside a task, such as a thread that cannot load its module
 */
export function createImportThreads(
  maxThreads: number,
  onError: (error: Error) => void,
): ImportThreads {
  const pool = new Piscina({
    filename: new URL('./worker-entry.mjs', import.meta.url).href,
    minThreads: 0,
    maxThreads,
    idleTimeout: 60_000,
  });
  pool.on('error', onError);
  return {
    async inspect(task) {
      return answerOf<Inspection>(await pool.run(task, { name: 'inspect' }));
    },
    async *pieces(task) {
      const { port1: port, port2: far } = new MessageChannel();
      const stop = new AbortController();
      const work = pool.run(
        { ...task, port: far },
        { name: 'rows', transferList: [far], signal: stop.signal },
      ) as Promise<Outcome<null>>;
      // What the work answers is looked at below; a taker who leaves early aborts it.
      work.catch(() => port.close());
      try {
        yield* received(port, work);
      } finally {
        port.close();
        stop.abort();
      }
    },
    close: () => pool.destroy(),
  };
}

async function* received(port: MessagePort, work: Promise<Outcome<null>>): AsyncGenerator<Piece> {
  for (;;) {
    const piece = await Promise.race([nextPiece(port), work.then(() => null)]);
    if (piece === null) break;
    yield piece;
    port.postMessage('more');
  }
  answerOf(await work);
}

function nextPiece(port: MessagePort): Promise<Piece> {
  return new Promise((resolve) => port.once('message', resolve));
}

function answerOf<T>(outcome: Outcome<T>): T {
  if (!outcome.ok) throw new FileProblem(outcome.code, outcome.params);
  return outcome.value;
}
