import { createInterface } from 'node:readline';
import { Writable } from 'node:stream';

/** Asks on the terminal; what is typed is not shown. */
export async function askHidden(question: string): Promise<string> {
  process.stderr.write(question);
  // The line editor writes what is typed to its output: here, nowhere.
  const nowhere = new Writable({ write: (_chunk, _encoding, done) => done() });
  const lines = createInterface({ input: process.stdin, output: nowhere, terminal: true });
  try {
    return await new Promise<string>((resolve, reject) => {
      lines.once('line', resolve);
      lines.once('SIGINT', () => reject(new Error('interrupted')));
      lines.once('close', () => resolve(''));
    });
  } finally {
    lines.close();
    process.stderr.write('\n');
  }
}

/** The first lines of standard input, where no terminal is there to ask. */
export async function readLines(count: number): Promise<string[]> {
  const lines: string[] = [];
  for await (const line of createInterface({ input: process.stdin })) {
    lines.push(line);
    if (lines.length === count) {
      break;
    }
  }
  return lines;
}
