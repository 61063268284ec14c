/** The one entry of the engine that the browser may load: types of the result, and helpers without weight. */
export type { BandPoint } from './analysis/band.ts';
export type { Residual } from './analysis/residuals.ts';
export type * from './analysis/result.ts';
export type { StatsErrorCode, StatsErrorParameters } from './errors.ts';
export type { Verdict } from './independence/verdict.ts';
export { quantile, quantileOfSorted } from './table/quantile.ts';
