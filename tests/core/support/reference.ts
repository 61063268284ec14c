import { readFileSync } from 'node:fs';
import papaparse from 'papaparse';

/** One analysis of a reference folder: its columns and the numbers that R gave. */
export interface ReferenceAnalysis {
  name: string;
  data: string;
  columns: { subject: string; time: string; response: string; group?: string };
  structure: Record<string, unknown>;
  ols: { coefficients: Record<string, Record<string, number>>; sigma: number; r_squared: number };
  pooled: {
    coefficients: Record<string, Record<string, number>>;
    group_test?: Record<string, number>;
  };
  independence: {
    lr_test: {
      loglik_none: number;
      loglik_random_intercept: number;
      sd_intercept: number;
      sd_residual: number;
      lr: number;
      p: number;
    };
    permutation: { statistic: number; p: number; draws: number };
    serial: {
      lag1: number;
      lag1_expected: number;
      permutation: { p: number; draws: number };
    };
    [block: string]: unknown;
  };
  per_subject: {
    lines: Record<string, unknown>[];
    not_fitted: string[];
    [name: string]: unknown;
  };
  band: {
    time: number;
    group?: string;
    estimate: number;
    lower: number;
    upper: number;
    df: number;
  }[];
  within_between: Record<string, Record<string, number> | null>;
  wild_bootstrap?: Record<string, ReferenceWild>;
}

export interface ReferenceWild {
  t: number;
  p: number;
  weights: string;
  draws: number;
  exact: boolean;
  webb_p?: number;
  lower?: number;
  upper?: number;
}

const root = new URL('../../reference/', import.meta.url);

export const DATA_SETS = [
  'hand-sized',
  'sleepstudy',
  'orthodont',
  'orange',
  'dietox',
  'petersen',
] as const;

/** Every analysis of a folder, as `expected.json` holds them. */
export function referenceAnalyses(folder: string): ReferenceAnalysis[] {
  const text = readFileSync(new URL(`${folder}/expected.json`, root), 'utf8');
  return (JSON.parse(text) as { analyses: ReferenceAnalysis[] }).analyses;
}

export function referenceAnalysis(folder: string, name: string): ReferenceAnalysis {
  const found = referenceAnalyses(folder).find((a) => a.name === name);
  if (!found) throw new Error(`tests/reference/${folder} has no analysis "${name}"`);
  return found;
}

/** Full path of a file of a reference folder. */
export const referencePath = (folder: string, file: string): URL =>
  new URL(`${folder}/${file}`, root);

/** Rows of a CSV file of a reference folder, as written. */
export function referenceRows(folder: string, file: string): Record<string, string>[] {
  const text = readFileSync(referencePath(folder, file), 'utf8');
  return papaparse.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true }).data;
}
