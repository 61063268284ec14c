/** The numbers that a list of records shows: the slope over time of the fit that was run. */
import type { z } from 'zod';
import type { AnalysisResult } from '../../core/index.ts';
import type { RunFitRequest, recordSummarySchema } from '../contracts/analysis.ts';

export type Headline = z.infer<typeof recordSummarySchema>['headline'];

/** With groups it is the slope of the reference group. */
export function headlineOf(result: AnalysisResult, fit: RunFitRequest['fit']): Headline {
  const time =
    fit === 'ordinary' ? result.ols?.coefficients.time : result.pooled?.coefficients?.time;
  return {
    estimate: time?.estimate ?? null,
    lower: time?.lower ?? null,
    upper: time?.upper ?? null,
    df: time?.df ?? null,
    subjects: result.structure.subjects,
    readings: result.structure.readings,
  };
}
