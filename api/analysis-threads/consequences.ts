/** What taking repeated readings as independent would do to each coefficient, and in which direction. */
import type { AnalysisResult } from '../../core/index.ts';
import type { Consequence } from './jobs.ts';

/** A ratio of errors within five per cent of one changes no decision. */
const ABOUT_RIGHT = 1.05;

/**
 * @param result with the parts check, ols and cr; the ordinary part open
 */
export function consequencesOf(result: AnalysisResult): Consequence[] {
  const ordinary = result.ols?.coefficients ?? {};
  return Object.entries(result.pooled?.coefficients ?? {}).map(([coefficient, robust]) => {
    const ratio = numberIn(result.independence?.se_ratio, coefficient);
    return {
      coefficient,
      estimate: robust.estimate,
      seOrdinary: ordinary[coefficient]?.se ?? null,
      seRobust: robust.se_cr2,
      ratio,
      moulton: numberIn(result.independence?.moulton, coefficient),
      pOrdinary: ordinary[coefficient]?.p ?? null,
      pRobust: robust.p,
      dfRobust: robust.df,
      ordinaryErrorIs: directionOf(ratio),
    };
  });
}

function numberIn(
  block: Record<string, number | string | null> | null | undefined,
  name: string,
): number | null {
  const value = block?.[name];
  return typeof value === 'number' ? value : null;
}

function directionOf(ratio: number | null): Consequence['ordinaryErrorIs'] {
  if (ratio === null || !(ratio > 0)) {
    return 'unknown';
  }
  if (ratio > ABOUT_RIGHT) {
    return 'too small';
  }
  return ratio < 1 / ABOUT_RIGHT ? 'too large' : 'about right';
}
