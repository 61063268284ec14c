import { StatsError } from '../errors.ts';
import { type Observe, unobserved } from './timed-parts.ts';

/** The parts that can be asked for. */
export const parts = [
  'check',
  'ols',
  'lines',
  'cr',
  'wild',
  'lmm',
  'gee',
  'within',
  'assumptions',
] as const;

export type Part = (typeof parts)[number];

/** How an analysis is to be run. */
export interface AnalyseOptions {
  /** Seed of every random procedure, a whole number ≥ 0; 1 if left out. */
  readonly seed?: number;
  /** Draws of the wild bootstrap and of both permutations; 1999 if left out. */
  readonly draws?: number;
  /** The parts wanted; all if left out. */
  readonly only?: readonly string[];
  /** Why ordinary results of repeated readings are wanted; without it they stay locked. */
  readonly acknowledge?: string;
  /** SHA-256 of the file's bytes, in hexadecimal. */
  readonly sha256?: string;
  /** Called around each part; for timing. */
  readonly observe?: Observe;
}

/** Options with every default in place. */
export interface Settings {
  readonly seed: number;
  readonly draws: number;
  readonly wants: (part: Part) => boolean;
  readonly acknowledge: string | null;
  readonly sha256: string | null;
  readonly observe: Observe;
}

export const DEFAULT_SEED = 1;
export const DEFAULT_DRAWS = 1999;
const MOST_DRAWS = 1_000_000;

/**
 * Checks the options and fills in the defaults.
 *
 * @throws StatsError bad_seed, bad_draws, unknown_part
 */
export function settingsOf(options: AnalyseOptions): Settings {
  const seed = options.seed ?? DEFAULT_SEED;
  const draws = options.draws ?? DEFAULT_DRAWS;
  if (!Number.isSafeInteger(seed) || seed < 0) throw new StatsError('bad_seed', { value: seed });
  if (!Number.isInteger(draws) || draws < 1 || draws > MOST_DRAWS) {
    throw new StatsError('bad_draws', { value: draws });
  }
  const wanted = new Set<string>(options.only ?? parts);
  for (const value of wanted) {
    if (!parts.some((part) => part === value)) throw new StatsError('unknown_part', { value });
  }
  const acknowledge = options.acknowledge?.trim() ?? '';
  return {
    seed,
    draws,
    wants: (part) => wanted.has(part),
    acknowledge: acknowledge === '' ? null : acknowledge,
    sha256: options.sha256 ?? null,
    observe: options.observe ?? unobserved,
  };
}
