/** What goes into a computing thread and what comes out: plain values only, for they are copied. */
import type { BandPoint } from '../../core/index.ts';
import type { SpecificationInput } from '../contracts/analysis.ts';
import type { UsedCounts } from './cut-table.ts';
import type { Headline } from './headline.ts';
import type { RecordContent } from './record-content.ts';

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

/** What of a record is settled before its fit runs. */
export type RecordFrame = Omit<RecordContent, 'checkText' | 'resultText' | 'engine'>;

export interface FitJob extends CutJob {
  record: RecordFrame;
  /** Opaque ids of the subjects by code, and who left early. */
  ids: ReadonlyMap<string, string>;
  ended: readonly { code: string; word: string; day: number | null }[];
}

/** Texts and not objects: they are stored as they are, and a large one costs the server's loop nothing. */
export interface FitAnswer {
  engine: string;
  repeats: boolean;
  checkText: string;
  /** Canonical JSON of the whole result. */
  resultText: string;
  /** JSON of the picture, as the contract has it. */
  pictureText: string;
  headline: Headline;
  contentSha256: string;
}

/** Before ids and ends are put to the subjects. */
export interface Drawing {
  subjects: {
    code: string;
    group: string | null;
    readings: { time: number; value: number; visit: string }[];
  }[];
  visits: { name: string; time: number; n: number }[];
  band: { group: string | null; points: (Omit<BandPoint, 'group'> & { remaining: number })[] }[];
}
