/** `tetherline-analysis/1` as the API answers it: the parts that exist; those not built are null with a reason. */
import { z } from 'zod';

const n = z.number();
const maybe = n.nullable();
const interval = z.looseObject({ estimate: n, lower: maybe, upper: maybe });

/** Why a subject has no line of its own. */
export const notFittedCodes = ['one_reading', 'one_time'] as const;

/** English for scripts, and codes for pages, which have words of their own. */
export const adviceSchema = z.object({
  fit: z.string(),
  why: z.string(),
  unless: z.string(),
  /** Records keep what they were given: an older one may hold the English alone. */
  codes: z.object({ fit: z.string(), why: z.string(), unless: z.string() }).optional(),
  params: z.record(z.string(), z.union([z.string(), z.number()])).optional(),
});

export const structureSchema = z.looseObject({
  subjects: n,
  readings: n,
  subjects_with_repeats: n,
  repeats: z.object({ min: n, median: n, max: n }),
  distinct_times: n,
  replicates: n,
  share_following: n,
});

export const independenceSchema = z.looseObject({
  verdict: z.enum([
    'no_repeats',
    'negative',
    'repeats_none_detected',
    'exchangeable',
    'serial',
    'exchangeable_and_serial',
  ]),
  warn: z.boolean(),
  headline: z.string(),
  icc_residual: interval.nullable(),
  icc_response: interval.nullable(),
  anova: z.object({ msb: n, msw: n, n0: n }).nullable(),
  design_effect: maybe,
  effective_n: maybe,
  lr_test: z.object({ lr: n, p: n }).nullable(),
  permutation: z.object({ statistic: n, p: n, draws: n }).nullable(),
  serial: z
    .looseObject({
      lag1: maybe,
      lag1_expected: maybe,
      permutation: z.object({ statistic: n, p: n, draws: n }).nullable(),
      phi: maybe,
      median_gap: maybe,
      on_means: z.boolean(),
    })
    .nullable(),
  variogram: z
    .looseObject({ bins: z.array(z.object({ lag: n, value: n, pairs: n })), total: maybe })
    .nullable(),
  se_ratio: z.record(z.string(), maybe.or(z.string())).nullable(),
  moulton: z.record(z.string(), maybe.or(z.string())).nullable(),
});

export const olsCoefficientSchema = z.looseObject({
  estimate: n,
  se: n,
  t: maybe,
  df: n,
  p: maybe,
  lower: maybe,
  upper: maybe,
});

export const pooledCoefficientSchema = z.looseObject({
  estimate: n,
  se_cr0: maybe,
  se_cr1: maybe,
  se_cr1s: maybe,
  se_cr2: maybe,
  se_cr3: maybe,
  df: maybe,
  t: maybe,
  p: maybe,
  lower: maybe,
  upper: maybe,
});

export const wildBootstrapSchema = z.looseObject({
  t: maybe,
  p: maybe,
  lower: maybe,
  upper: maybe,
  draws: n,
  weights: z.enum(['rademacher_enumerated', 'webb', 'rademacher']),
});

export const ownLineSchema = z.looseObject({
  subject: z.string(),
  n,
  intercept: n,
  slope: n,
  slope_se: maybe,
});

export const analysisResultSchema = z.looseObject({
  format: z.literal('tetherline-analysis/1'),
  engine: z.string(),
  seed: n,
  group_levels: z.array(z.string()).nullable(),
  input: z.looseObject({
    rows: n,
    used: n,
    dropped: z.array(z.object({ line: n, reason: z.string() })),
    sha256: z.string(),
  }),
  structure: structureSchema,
  independence: independenceSchema.nullable(),
  ols: z
    .looseObject({
      coefficients: z.record(z.string(), olsCoefficientSchema),
      sigma: n,
      r_squared: maybe,
    })
    .nullable(),
  ols_locked: z.string().nullable(),
  per_subject: z
    .looseObject({
      lines: z.array(ownLineSchema),
      not_fitted: z.array(
        z.object({
          subject: z.string(),
          reason: z.string(),
          code: z.enum(notFittedCodes).optional(),
        }),
      ),
      mean_slope: maybe,
      sd_slope: maybe,
      mean_slope_lower: maybe,
      mean_slope_upper: maybe,
    })
    .nullable(),
  pooled: z
    .looseObject({
      coefficients: z.record(z.string(), pooledCoefficientSchema),
      wild_bootstrap: z.record(z.string(), wildBootstrapSchema).nullable(),
    })
    .nullable(),
  advice: z.array(adviceSchema),
});
