import type { WildWeights } from '../cluster/wild-weights.ts';
import type { Verdict } from '../independence/verdict.ts';
import type { NotFittedReason } from '../lines/own-lines.ts';
import type { AdviceText } from '../words/advice.ts';

/**
 * The result `tetherline-analysis/1`: pure JSON, no dates, no times, never NaN or Infinity. What can't be given is
 * null, with its reason in a sibling key that ends in `_reason`.
 */
export interface AnalysisResult {
  format: 'tetherline-analysis/1';
  engine: string;
  seed: number;
  group_levels: string[] | null;
  group_levels_reason?: string;
  input: InputBlock;
  structure: StructureBlock;
  independence: IndependenceBlock | null;
  independence_reason?: string;
  ols: OrdinaryBlock | null;
  ols_reason?: string;
  ols_locked: string | null;
  ols_locked_reason?: string;
  per_subject: OwnLinesBlock | null;
  per_subject_reason?: string;
  pooled: PooledBlock | null;
  pooled_reason?: string;
  lmm: null;
  lmm_reason?: string;
  gee: null;
  gee_reason?: string;
  within_between: WithinBetweenBlock | null;
  within_between_reason?: string;
  assumptions: null;
  assumptions_reason?: string;
  advice: Advice[];
}

export interface InputBlock {
  rows: number;
  used: number;
  dropped: { line: number; reason: string }[];
  sha256: string | null;
  sha256_reason?: string;
}

export interface StructureBlock {
  subjects: number;
  readings: number;
  subjects_with_repeats: number;
  repeats: { min: number; median: number; max: number };
  distinct_times: number;
  replicates: number;
  share_following: number;
}

export interface IccBlock {
  estimate: number;
  lower: number;
  upper: number;
}

export interface PermutationBlock {
  statistic: number;
  p: number;
  draws: number;
}

/** Keyed by coefficient; a null has a sibling `NAME_reason`. */
export type ByCoefficient = Record<string, number | string | null>;

export interface SerialBlock {
  lag1: number | null;
  lag1_reason?: string;
  lag1_expected: number | null;
  lag1_expected_reason?: string;
  permutation: PermutationBlock | null;
  permutation_reason?: string;
  phi: number | null;
  phi_reason?: string;
  median_gap: number | null;
  median_gap_reason?: string;
  on_means: boolean;
  loglik: null;
  loglik_reason?: string;
  aic: null;
  aic_reason?: string;
  bic: null;
  bic_reason?: string;
}

export interface VariogramBlock {
  bins: { lag: number; value: number; pairs: number }[];
  total: number | null;
}

export interface IndependenceBlock {
  verdict: Verdict;
  warn: boolean;
  headline: string;
  icc_residual: IccBlock | null;
  icc_residual_reason?: string;
  icc_response: IccBlock | null;
  icc_response_reason?: string;
  anova: { msb: number; msw: number; n0: number } | null;
  anova_reason?: string;
  design_effect: number | null;
  design_effect_reason?: string;
  effective_n: number | null;
  effective_n_reason?: string;
  lr_test: { lr: number; p: number } | null;
  lr_test_reason?: string;
  permutation: PermutationBlock | null;
  permutation_reason?: string;
  serial: SerialBlock | null;
  serial_reason?: string;
  variogram: VariogramBlock | null;
  variogram_reason?: string;
  se_ratio: ByCoefficient;
  moulton: ByCoefficient | null;
  moulton_reason?: string;
}

export interface OrdinaryCoefficient {
  estimate: number;
  se: number;
  t: number | null;
  t_reason?: string;
  df: number;
  p: number | null;
  p_reason?: string;
  lower: number;
  upper: number;
}

export interface OrdinaryBlock {
  coefficients: Record<string, OrdinaryCoefficient>;
  sigma: number;
  r_squared: number | null;
  r_squared_reason?: string;
  /** "independence not met", where readings repeat. */
  stamp?: string;
  /** Why the ordinary fit was wanted, where readings repeat. */
  acknowledged?: string;
}

export interface OwnLineBlock {
  subject: string;
  n: number;
  intercept: number;
  slope: number;
  slope_se: number | null;
  slope_se_reason?: string;
  /** By the residual variance pooled over all own lines. */
  slope_se_pooled: number | null;
  slope_se_pooled_reason?: string;
}

export interface OwnLinesBlock {
  lines: OwnLineBlock[];
  not_fitted: { subject: string; reason: string; code: NotFittedReason }[];
  mean_slope: number | null;
  mean_slope_reason?: string;
  sd_slope: number | null;
  sd_slope_reason?: string;
  mean_slope_lower: number | null;
  mean_slope_lower_reason?: string;
  mean_slope_upper: number | null;
  mean_slope_upper_reason?: string;
  /** Weighted by inverse variances under one residual variance. */
  weighted_mean_slope: number | null;
  weighted_mean_slope_reason?: string;
}

export interface PooledCoefficient {
  estimate: number;
  se_cr0: number;
  se_cr1: number;
  se_cr1s: number;
  se_cr2: number;
  se_cr3: number | null;
  se_cr3_reason?: string;
  df: number | null;
  df_reason?: string;
  t: number | null;
  t_reason?: string;
  p: number | null;
  p_reason?: string;
  lower: number | null;
  lower_reason?: string;
  upper: number | null;
  upper_reason?: string;
}

export interface WildBlock {
  t: number;
  p: number;
  lower: number | null;
  lower_reason?: string;
  upper: number | null;
  upper_reason?: string;
  draws: number;
  weights: WildWeights;
  /** Only beside an enumeration of five subjects or fewer. */
  webb_p?: number;
}

export interface GroupTestBlock {
  f: number;
  df1: number;
  df2: number;
  p: number;
}

export interface PooledBlock {
  coefficients: Record<string, PooledCoefficient> | null;
  coefficients_reason?: string;
  wild_bootstrap: Record<string, WildBlock> | null;
  wild_bootstrap_reason?: string;
  /** All slope differences between groups together, with more than two levels. */
  group_test: GroupTestBlock | null;
  group_test_reason?: string;
}

export interface SplitSlope {
  estimate: number;
  se_cr2: number;
  df: number | null;
  df_reason?: string;
  p: number | null;
  p_reason?: string;
}

export interface WithinBetweenBlock {
  within: SplitSlope;
  between: SplitSlope | null;
  between_reason?: string;
  /** between − within. */
  difference: SplitSlope | null;
  difference_reason?: string;
}

export type Advice = AdviceText;
