/** Runs in a thread: looks at a file, or sends its rows as pieces of COPY text. */
import type { MessagePort } from 'node:worker_threads';
import { copyLine } from './copy-text.ts';
import { FileProblem } from './file-problem.ts';
import { type Inspection, inspectFile } from './inspect-file.ts';
import { makeRowReader } from './read-row.ts';
import { readHeader, rowsOf } from './rows-of.ts';
import type { InspectTask, Outcome, Piece, RowsTask } from './threads.ts';

/** Large enough that messages are few, small enough that memory stays flat. */
const ROWS_A_PIECE = 2000;

export function inspect(task: InspectTask): Promise<Outcome<Inspection>> {
  return outcomeOf(() => inspectFile(task.path, task.secretNames));
}

export function rows(task: RowsTask & { port: MessagePort }): Promise<Outcome<null>> {
  return outcomeOf(async () => {
    await sendRows(task, task.port);
    return null;
  });
}

async function outcomeOf<T>(work: () => Promise<T>): Promise<Outcome<T>> {
  try {
    return { ok: true, value: await work() };
  } catch (error) {
    if (error instanceof FileProblem) return { ok: false, code: error.code, params: error.params };
    throw error;
  }
}

async function sendRows(task: RowsTask, port: MessagePort): Promise<void> {
  let read: ReturnType<typeof makeRowReader> | null = null;
  let lines: string[] = [];
  /** Waits until the piece is taken, so that at most one is under way. */
  const flush = async () => {
    const taken = new Promise<void>((resolve) => port.once('message', () => resolve()));
    port.postMessage({ text: lines.join(''), rows: lines.length } satisfies Piece);
    lines = [];
    await taken;
  };
  for await (const row of rowsOf(task.path, task.delimiter)) {
    if (read === null) {
      read = makeRowReader(readHeader(row), task.mapping, task.measure);
      continue;
    }
    lines.push(copyLine(read(row.cells, row.line)));
    if (lines.length === ROWS_A_PIECE) await flush();
  }
  if (lines.length > 0) await flush();
}
