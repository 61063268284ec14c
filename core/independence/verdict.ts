/** What the readings say about dependence, a closed set. Only `no_repeats` does not warn. */
export type Verdict =
  | 'no_repeats'
  | 'negative'
  | 'repeats_none_detected'
  | 'exchangeable'
  | 'serial'
  | 'exchangeable_and_serial';

const LEVEL = 0.05;

/** What the verdict is taken from. */
export interface VerdictEvidence {
  readonly repeats: boolean;
  readonly identicalRepeats: boolean;
  /** p of the random intercept's likelihood ratio; null where it can't be judged. */
  readonly pExchangeable: number | null;
  /** Upper limit of the residual ICC; null where there is none. */
  readonly iccUpper: number | null;
}

/**
 * The verdict from the exchangeable part. The design decides the warning before any p value does: a quiet test is
 * no licence for an ordinary fit.
 */
export function verdictOf(evidence: VerdictEvidence): Verdict {
  if (!evidence.repeats) return 'no_repeats';
  if (evidence.identicalRepeats) return 'exchangeable';
  if (evidence.pExchangeable === null) return 'repeats_none_detected';
  if (evidence.pExchangeable < LEVEL) return 'exchangeable';
  const negative = evidence.iccUpper !== null && evidence.iccUpper < 0;
  return negative ? 'negative' : 'repeats_none_detected';
}
