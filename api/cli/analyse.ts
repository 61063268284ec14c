import { readFileSync, writeFileSync } from 'node:fs';
import { analyse, StatsError } from '../../core/index.ts';
import { commandWords } from '../../core/words/command.ts';
import { refusalText } from '../../core/words/refusals.ts';
import { LongCsvError } from '../analysis-input/long-csv-error.ts';
import { readLongCsv } from '../analysis-input/read-long-csv.ts';
import { type AnalyseArguments, readArguments, UsageError } from './analyse-options.ts';
import { createTimings } from './analyse-timings.ts';

/**
 * The headless command: a long CSV in, one JSON document out. Exit 0 on success, 2 on bad use or bad input with one
 * line that names the place and the mend, 1 on a bug.
 */

const BAD = 2;
const BUG = 1;

/** Bad input that the file system tells of. */
class FileError extends Error {
  override readonly name = 'FileError';
}

function codeOf(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? error.code : undefined;
  return typeof code === 'string' ? code : String(error);
}

function readBytes(file: string): Uint8Array {
  try {
    return readFileSync(file);
  } catch (error) {
    const code = codeOf(error);
    if (code === 'ENOENT' || code === 'ENOTDIR') throw new FileError(commandWords.notFound());
    if (code === 'EISDIR') throw new FileError(commandWords.isFolder());
    throw new FileError(commandWords.unreadable(code));
  }
}

function write(text: string, out: string | undefined): void {
  if (out === undefined) {
    process.stdout.write(text);
    return;
  }
  try {
    writeFileSync(out, text);
  } catch (error) {
    throw new UsageError(`${out}: ${commandWords.unwritable(codeOf(error))}`);
  }
}

function run(args: AnalyseArguments): void {
  const timings = createTimings();
  const { table, sha256 } = timings.observe('read', () =>
    readLongCsv(readBytes(args.file), args.columns),
  );
  const result = analyse(table, {
    seed: args.seed,
    draws: args.draws,
    only: args.only,
    acknowledge: args.acknowledge,
    sha256,
    observe: timings.observe,
  });
  write(`${JSON.stringify(result, null, 2)}\n`, args.out);
  if (args.timings) process.stderr.write(`${JSON.stringify(timings.report())}\n`);
}

function csvPlace({ place }: LongCsvError): string {
  const line = place.line === undefined ? '' : `line ${place.line}, `;
  const column = place.column === undefined ? '' : `column "${place.column}", `;
  return `${line}${column}`.replace(/, $/, ': ');
}

/** The one line that says what was wrong, or null where it is a bug. */
function complaint(error: unknown, file: string | null): string | null {
  const where = file === null ? '' : `${file}: `;
  if (error instanceof UsageError) return error.message;
  if (error instanceof FileError) return `${where}${error.message}`;
  if (error instanceof LongCsvError) return `${where}${csvPlace(error)}${error.message}`;
  if (error instanceof StatsError) {
    const { place, text } = refusalText(error);
    return `${where}${place === null ? '' : `${place}: `}${text}`;
  }
  return null;
}

function main(args: readonly string[]): void {
  if (args.includes('--help')) {
    process.stdout.write(commandWords.help());
    return;
  }
  let file: string | null = null;
  try {
    const asked = readArguments(args);
    file = asked.file;
    run(asked);
  } catch (error) {
    const line = complaint(error, file);
    if (line === null) {
      const message = error instanceof Error ? (error.stack ?? error.message) : String(error);
      process.stderr.write(`${commandWords.bug(message)}\n`);
      process.exitCode = BUG;
    } else {
      process.stderr.write(`${line.replaceAll('\n', ' ')}\n`);
      process.exitCode = BAD;
    }
  }
}

// Whoever reads the result may stop early, as `head` does; that is no bug.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
});
main(process.argv.slice(2));
