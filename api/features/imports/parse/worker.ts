/** The thread in which files are parsed, so that the server's own loop only passes pieces of text on. */
import { parentPort, workerData } from 'node:worker_threads';
import type { ImportMapping } from '../../../contracts/imports.ts';
import { copyLine } from './copy-text.ts';
import { FileProblem } from './file-problem.ts';
import { inspectFile } from './inspect-file.ts';
import { makeRowReader } from './read-row.ts';
import type { MeasureForm } from './read-value.ts';
import { type Delimiter, readHeader, rowsOf } from './rows-of.ts';
import type { FromWorker } from './thread.ts';

export type WorkerTask =
  | { kind: 'inspect'; path: string; secretNames: string[] }
  | {
      kind: 'rows';
      path: string;
      delimiter: Delimiter;
      mapping: ImportMapping;
      measure: MeasureForm & { per: 'visit' | 'subject' };
    };

/** Large enough that messages are few, small enough that memory stays flat. */
const ROWS_A_PIECE = 2000;

const port = parentPort;
if (!port) throw new Error('this module runs in a worker thread');
const send = (message: FromWorker) => port.postMessage(message);

/** Resolves when the main thread asks for more. */
function asked(): Promise<void> {
  return new Promise((resolve) => port?.once('message', () => resolve()));
}

async function sendRows(task: Extract<WorkerTask, { kind: 'rows' }>): Promise<void> {
  let read: ReturnType<typeof makeRowReader> | null = null;
  let lines: string[] = [];
  const flush = async () => {
    const next = asked();
    send({ kind: 'piece', text: lines.join(''), rows: lines.length });
    lines = [];
    await next;
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
  send({ kind: 'end' });
}

async function run(task: WorkerTask): Promise<void> {
  try {
    if (task.kind === 'inspect') {
      send({ kind: 'inspected', inspection: await inspectFile(task.path, task.secretNames) });
    } else {
      await sendRows(task);
    }
  } catch (error) {
    if (error instanceof FileProblem) {
      send({ kind: 'problem', code: error.code, params: error.params });
    } else {
      send({
        kind: 'crash',
        message: error instanceof Error ? (error.stack ?? error.message) : String(error),
      });
    }
  } finally {
    port?.close();
  }
}

await run(workerData as WorkerTask);
