/** The server's side of the parsing thread. */
import { once } from 'node:events';
import { Worker } from 'node:worker_threads';
import { FileProblem, type FileProblemCode, type Params } from './file-problem.ts';
import type { Inspection } from './inspect-file.ts';
import type { WorkerTask } from './worker.ts';

export type FromWorker =
  | { kind: 'inspected'; inspection: Inspection }
  | { kind: 'piece'; text: string; rows: number }
  | { kind: 'end' }
  | { kind: 'problem'; code: FileProblemCode; params: Params }
  | { kind: 'crash'; message: string };

function startWorker(task: WorkerTask): Worker {
  return new Worker(new URL('./worker-entry.mjs', import.meta.url), {
    workerData: task,
  });
}

async function nextMessage(worker: Worker): Promise<FromWorker> {
  const [message] = (await once(worker, 'message')) as [FromWorker];
  if (message.kind === 'problem') throw new FileProblem(message.code, message.params);
  if (message.kind === 'crash') throw new Error(`the parsing thread failed: ${message.message}`);
  return message;
}

export async function inspectInThread(path: string, secretNames: string[]): Promise<Inspection> {
  const worker = startWorker({ kind: 'inspect', path, secretNames });
  try {
    const message = await nextMessage(worker);
    if (message.kind !== 'inspected') throw new Error('the parsing thread answered out of turn');
    return message.inspection;
  } finally {
    await worker.terminate();
  }
}

/** Pieces of COPY text; the thread waits until each is taken, so a slow database holds it back. */
export async function* piecesInThread(
  task: Omit<Extract<WorkerTask, { kind: 'rows' }>, 'kind'>,
): AsyncGenerator<{ text: string; rows: number }> {
  const worker = startWorker({ kind: 'rows', ...task });
  try {
    let message = await nextMessage(worker);
    while (message.kind === 'piece') {
      yield { text: message.text, rows: message.rows };
      const next = nextMessage(worker);
      worker.postMessage('more');
      message = await next;
    }
  } finally {
    await worker.terminate();
  }
}
