import { describe, expect, test } from 'vitest';
import { ENGINE_VERSION } from '../../core/index.ts';
import { analyseReference, analyseRows, type Result, type Row } from './support/engine.ts';
import { holes } from './support/no-holes.ts';
import { referenceAnalysis } from './support/reference.ts';

// The names of `tetherline-analysis/1` that scripts and records rely on: each stands in every result, as a
// value or as null with its reason, and is never left out.
const TOP = [
  'format',
  'engine',
  'seed',
  'group_levels',
  'input',
  'structure',
  'independence',
  'ols',
  'ols_locked',
  'per_subject',
  'pooled',
  'lmm',
  'gee',
  'within_between',
  'assumptions',
  'advice',
];
const BLOCKS: Record<string, string[]> = {
  input: ['rows', 'used', 'dropped', 'sha256'],
  structure: [
    'subjects',
    'readings',
    'subjects_with_repeats',
    'repeats',
    'distinct_times',
    'replicates',
    'share_following',
  ],
  independence: [
    'verdict',
    'warn',
    'headline',
    'icc_residual',
    'icc_response',
    'anova',
    'design_effect',
    'effective_n',
    'lr_test',
    'permutation',
    'serial',
    'variogram',
    'se_ratio',
    'moulton',
  ],
  ols: ['coefficients', 'sigma', 'r_squared'],
  per_subject: [
    'lines',
    'not_fitted',
    'mean_slope',
    'sd_slope',
    'mean_slope_lower',
    'mean_slope_upper',
  ],
  pooled: ['coefficients', 'wild_bootstrap'],
};
const OLS_COEFFICIENT = ['estimate', 'se', 't', 'df', 'p', 'lower', 'upper'];
const POOLED_COEFFICIENT = [
  'estimate',
  'se_cr0',
  'se_cr1',
  'se_cr1s',
  'se_cr2',
  'se_cr3',
  'df',
  't',
  'p',
  'lower',
  'upper',
];
const WILD = ['t', 'p', 'lower', 'upper', 'draws', 'weights'];
const SERIAL = [
  'lag1',
  'lag1_expected',
  'permutation',
  'phi',
  'median_gap',
  'on_means',
  'loglik',
  'aic',
  'bic',
];

function missing(record: unknown, names: readonly string[], where: string): string[] {
  if (record === null) return [];
  return names.filter((name) => !(name in (record as object))).map((name) => `${where}.${name}`);
}

function allMissing(result: Result): string[] {
  const blocks = Object.entries(BLOCKS).flatMap(([block, names]) =>
    missing(result[block as keyof Result], names, block),
  );
  const each = (map: object | null | undefined, names: string[], where: string): string[] =>
    Object.entries(map ?? {})
      .filter(([key]) => !key.endsWith('_reason'))
      .flatMap(([key, value]) => missing(value, names, `${where}.${key}`));
  return [
    ...missing(result, TOP, 'result'),
    ...blocks,
    ...each(result.ols?.coefficients, OLS_COEFFICIENT, 'ols'),
    ...each(result.pooled?.coefficients, POOLED_COEFFICIENT, 'pooled'),
    ...each(result.pooled?.wild_bootstrap, WILD, 'wild_bootstrap'),
    ...missing(result.independence?.serial ?? null, SERIAL, 'serial'),
    ...missing(result.structure.repeats, ['min', 'median', 'max'], 'repeats'),
    ...(result.per_subject?.lines ?? []).flatMap((line) =>
      missing(line, ['subject', 'n', 'intercept', 'slope', 'slope_se'], 'line'),
    ),
    ...result.advice.flatMap((a) => missing(a, ['fit', 'why', 'unless'], 'advice')),
  ];
}

const once: Row[] = Array.from({ length: 12 }, (_, k): Row => [`s${k}`, k % 4, (k * 5) % 7]);
const results: [string, () => Result][] = [
  [
    'repeats',
    () => analyseReference('hand-sized', referenceAnalysis('hand-sized', 'twelve readings')),
  ],
  [
    'two groups',
    () => analyseReference('orthodont', referenceAnalysis('orthodont', 'eleven by sex')),
  ],
  [
    'three groups',
    () => analyseReference('dietox', referenceAnalysis('dietox', 'by vitamin'), { draws: 99 }),
  ],
  ['one reading each', () => analyseRows(once)],
  ['a perfect line', () => analyseRows(once.map(([, t], k): Row => [`s${k % 5}`, t, 2 * t]))],
  ['locked', () => analyseRows(once.map(([, t, y], k): Row => [`s${k % 5}`, t, y]))],
  [
    'parts left out',
    () =>
      analyseRows(
        once.map(([, t, y], k): Row => [`s${k % 5}`, t, y]),
        { only: ['lines'] },
      ),
  ],
];

describe.each(results)('the fixed names: %s', (_, run) => {
  const result = run();

  test('none is left out, and no value is a hole', () => {
    expect(allMissing(result)).toEqual([]);
    expect(holes(result)).toEqual([]);
  });

  test('format, engine and seed say what made it', () => {
    expect(result.format).toBe('tetherline-analysis/1');
    expect(result.engine).toBe(ENGINE_VERSION);
    expect(result.seed).toBe(1);
  });

  test('coefficients, ratios and factors have the same keys', () => {
    const keys = Object.keys(result.pooled?.coefficients ?? {});
    const bare = (map: object | null | undefined): string[] =>
      Object.keys(map ?? {}).filter((key) => !key.endsWith('_reason'));
    if (result.independence && result.pooled) {
      expect(bare(result.independence.se_ratio)).toEqual(keys);
      if (result.independence.moulton) expect(bare(result.independence.moulton)).toEqual(keys);
    }
    // The bootstrap covers every coefficient but the intercept.
    const wild = result.pooled?.wild_bootstrap;
    if (wild) expect(bare(wild)).toEqual(keys.slice(1));
  });
});

test('the verdict words are a closed set, and the advice names only fits that exist', () => {
  const verdicts = [
    'no_repeats',
    'negative',
    'repeats_none_detected',
    'exchangeable',
    'serial',
    'exchangeable_and_serial',
  ];
  for (const [, run] of results) {
    const result = run();
    if (result.independence) expect(verdicts).toContain(result.independence.verdict);
    for (const { why, unless } of result.advice) {
      expect(`${why} ${unless}`).not.toMatch(/mixed model|GEE|estimating equation/i);
    }
  }
});
