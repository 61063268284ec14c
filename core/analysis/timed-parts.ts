/** The parts whose time the command can report. */
export const timedParts = [
  'read',
  'structure',
  'independence',
  'ols',
  'per_subject',
  'cr2',
  'wild_bootstrap',
  'permutation',
  'lmm_random_intercept',
  'lmm_random_slope',
  'gee_exchangeable',
  'gee_ar1',
  'assumptions',
] as const;

export type TimedPart = (typeof timedParts)[number];

/** Runs a part and returns its value; whoever calls the engine may time it, the engine has no clock. */
export type Observe = <T>(part: TimedPart, run: () => T) => T;

/** Runs without looking. */
export const unobserved: Observe = (_part, run) => run();
