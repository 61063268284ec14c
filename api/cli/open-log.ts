import { existsSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { type Logger, pino } from 'pino';
import type { Config } from '../config.ts';

const LARGEST_BYTES = 10_000_000;

/** Lines of JSON on standard output, for whatever gathers logs. */
export function openLog(config: Pick<Config, 'logLevel'>): Logger {
  return pino({ level: config.logLevel });
}

/** Lines of JSON in the data folder, so that the terminal keeps what a person needs to read. */
export function openLogFile(config: Pick<Config, 'logLevel'>, dataFolder: string): Logger {
  const file = join(dataFolder, 'server.log');
  if (existsSync(file) && statSync(file).size > LARGEST_BYTES) renameSync(file, `${file}.old`);
  return pino(
    { level: config.logLevel },
    pino.destination({ dest: file, mode: 0o600, sync: false }),
  );
}
