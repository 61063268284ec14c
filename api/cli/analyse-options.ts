import { parseArgs } from 'node:util';
import { commandWords } from '../../core/words/command.ts';

/** What the headless command was asked for. */
export interface AnalyseArguments {
  readonly file: string;
  readonly columns: { subject: string; time: string; response: string; group?: string };
  readonly seed?: number;
  readonly draws?: number;
  readonly only?: readonly string[];
  readonly acknowledge?: string;
  readonly timings: boolean;
  readonly out?: string;
}

/** Bad use of the command, in one line. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

const WITH_VALUE = [
  'subject',
  'time',
  'response',
  'group',
  'seed',
  'draws',
  'acknowledge',
  'only',
  'out',
] as const;

type ValueOption = (typeof WITH_VALUE)[number];

function isValueOption(name: string): name is ValueOption {
  return WITH_VALUE.some((option) => option === name);
}

function wholeNumber(name: string, value: string | undefined): number | undefined {
  if (value === undefined) return undefined;
  if (!/^\d+$/.test(value)) throw new UsageError(commandWords.notWhole(name, value));
  return Number(value);
}

function needed(values: ReadonlyMap<ValueOption, string>, name: ValueOption): string {
  const value = values.get(name);
  if (value === undefined) throw new UsageError(commandWords.missingOption(name));
  return value;
}

/**
 * Reads the arguments of the command.
 *
 * @throws UsageError in one line
 */
export function readArguments(args: readonly string[]): AnalyseArguments {
  const string = { type: 'string' } as const;
  const { tokens } = parseArgs({
    args: [...args],
    strict: false,
    tokens: true,
    allowPositionals: true,
    options: {
      ...Object.fromEntries(WITH_VALUE.map((name) => [name, string])),
      timings: { type: 'boolean' },
    },
  });
  const values = new Map<ValueOption, string>();
  const files: string[] = [];
  let timings = false;
  for (const token of tokens ?? []) {
    if (token.kind === 'positional') files.push(token.value);
    if (token.kind !== 'option') continue;
    if (token.name === 'timings') timings = true;
    else if (!isValueOption(token.name)) {
      throw new UsageError(commandWords.unknownOption(token.name));
    } else if (token.value === undefined) {
      throw new UsageError(commandWords.optionWithoutValue(token.name));
    } else if (values.has(token.name)) {
      throw new UsageError(commandWords.optionTwice(token.name));
    } else values.set(token.name, token.value);
  }
  const [file] = files;
  if (file === undefined || files.length > 1) throw new UsageError(commandWords.usage());
  const group = values.get('group');
  const columns = {
    subject: needed(values, 'subject'),
    time: needed(values, 'time'),
    response: needed(values, 'response'),
    ...(group === undefined ? {} : { group }),
  };
  return {
    file,
    columns,
    seed: wholeNumber('seed', values.get('seed')),
    draws: wholeNumber('draws', values.get('draws')),
    only: values
      .get('only')
      ?.split(',')
      .map((part) => part.trim()),
    acknowledge: values.get('acknowledge'),
    timings,
    out: values.get('out'),
  };
}
