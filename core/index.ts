/** The public face of the engine. */
export { analyse } from './analysis/analyse.ts';
export { type BandPoint, ordinaryBand, pooledBand } from './analysis/band.ts';
export { type AnalyseOptions, type Part, parts } from './analysis/options.ts';
export { dealtTwin, type Residual, residualsOf } from './analysis/residuals.ts';
export type * from './analysis/result.ts';
export { type Observe, type TimedPart, timedParts } from './analysis/timed-parts.ts';
export {
  type Reason,
  type ReasonCode,
  StatsError,
  type StatsErrorCode,
  type StatsErrorParameters,
} from './errors.ts';
export type { LongTable } from './table/long-table.ts';
export { ENGINE_VERSION } from './version.ts';
