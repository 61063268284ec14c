/** What goes into a computing thread and what comes out: plain values only, for they are copied. */
import type { AnalysisResult, BandPoint } from '../../core/index.ts';
import type { SpecificationInput } from '../contracts/analysis.ts';
import type { UsedCounts } from './cut-table.ts';

export interface CutJob {
  /** The canonical CSV of the cut. */
  bytes: Uint8Array;
  /** Its hash, repeated in the result. */
  sha256: string;
  specification: SpecificationInput;
  seed: number;
}

/** The engine's refusal, as a value: an error would lose its code on the way between threads. */
export interface Refused {
  ok: false;
  code: string;
  params: Record<string, string | number>;
}

export type Answer<T> = ({ ok: true } & T) | Refused;

export interface OwnResiduals {
  code: string;
  mean: number;
  residuals: number[];
}

export interface Consequence {
  coefficient: string;
  estimate: number;
  seOrdinary: number | null;
  seRobust: number | null;
  ratio: number | null;
  moulton: number | null;
  pOrdinary: number | null;
  pRobust: number | null;
  dfRobust: number | null;
  ordinaryErrorIs: 'too small' | 'too large' | 'about right' | 'unknown';
}

export interface CheckAnswer {
  counts: UsedCounts;
  engine: string;
  /** Whether a subject repeats, which locks the ordinary fit. */
  repeats: boolean;
  /** Canonical JSON of the check as a record keeps it: without the ordinary numbers. */
  text: string;
  consequences: Consequence[];
  observed: OwnResiduals[];
  dealt: OwnResiduals[];
}

export interface FitJob extends CutJob {
  fit: 'pooled' | 'ordinary';
  /** Why the ordinary fit is wanted, where readings repeat. */
  acknowledge: string | null;
}

export interface FitAnswer {
  counts: UsedCounts;
  engine: string;
  repeats: boolean;
  checkText: string;
  /** Canonical JSON of the whole result. */
  text: string;
  result: AnalysisResult;
  picture: PictureAnswer;
}

export interface PictureAnswer {
  subjects: {
    code: string;
    group: string | null;
    readings: { time: number; value: number; visit: string }[];
  }[];
  visits: { name: string; time: number; n: number }[];
  band: { group: string | null; points: (Omit<BandPoint, 'group'> & { remaining: number })[] }[];
}
