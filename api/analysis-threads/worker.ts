/** What runs in a computing thread. Each function takes and gives plain values only. */
import {
  type AnalysisResult,
  analyse,
  dealtTwin,
  ENGINE_VERSION,
  ordinaryBand,
  pooledBand,
  type Residual,
  residualsOf,
  StatsError,
} from '../../core/index.ts';
import { canonicalJson, type JsonValue } from './canonical-json.ts';
import { consequencesOf } from './consequences.ts';
import { type CutTable, tableOfCut } from './cut-table.ts';
import { type CutDifferenceCounts, differenceOfCuts } from './difference.ts';
import { headlineOf } from './headline.ts';
import type { Answer, CheckAnswer, CutJob, FitAnswer, FitJob, OwnResiduals } from './jobs.ts';
import { bandTimes, drawingOf, pictureOf, usedReadings } from './picture.ts';
import { contentSha256 } from './record-content.ts';

/** Opens the ordinary numbers for part 4 of the check, where they stand beside the robust ones. */
const FOR_COMPARISON = 'beside the robust errors, in the independence check';

export function difference(job: { earlier: Uint8Array; later: Uint8Array }): CutDifferenceCounts {
  const decoder = new TextDecoder('utf-8');
  return differenceOfCuts(decoder.decode(job.earlier), decoder.decode(job.later));
}

/** The independence check with its pictures. */
export function check(job: CutJob): Answer<CheckAnswer> {
  return answer(() => {
    const cut = tableOfCut(job.bytes, job.specification);
    const result = analyse(cut.table, {
      seed: job.seed,
      sha256: job.sha256,
      only: ['check', 'ols', 'cr'],
      acknowledge: FOR_COMPARISON,
    });
    return {
      counts: cut.counts,
      engine: ENGINE_VERSION,
      repeats: repeatsIn(result),
      text: checkText(cut, result),
      consequences: consequencesOf(result),
      observed: bySubject(residualsOf(cut.table)),
      dealt: bySubject(dealtTwin(cut.table, job.seed)),
    };
  });
}

/** A fit with everything its record keeps. Without a reason the engine itself keeps the ordinary part shut. */
export function fit(job: FitJob): Answer<FitAnswer> {
  return answer(() => {
    const cut = tableOfCut(job.bytes, job.specification);
    const { record } = job;
    const options = { seed: job.seed, sha256: job.sha256 };
    const reason = record.fit === 'ordinary' ? record.acknowledgement?.reason : undefined;
    const result = analyse(
      cut.table,
      reason === undefined ? options : { ...options, acknowledge: reason },
    );
    const texts = {
      checkText: checkText(cut, result),
      resultText: canonicalJson(asJson(result)),
      engine: ENGINE_VERSION,
    };
    return {
      ...texts,
      repeats: repeatsIn(result),
      pictureText: pictureText(cut, job),
      headline: headlineOf(result, record.fit),
      contentSha256: contentSha256({ ...record, ...texts }),
    };
  });
}

function pictureText(cut: CutTable, job: FitJob): string {
  const used = usedReadings(cut);
  const band = job.record.fit === 'ordinary' ? ordinaryBand : pooledBand;
  const line = band(cut.table, bandTimes(used));
  return canonicalJson(asJson(pictureOf(drawingOf(used, job.specification.unit, line), job)));
}

/** The check as a record keeps it: amount, type and advice, and no ordinary number. */
function checkText(cut: CutTable, result: AnalysisResult): string {
  return canonicalJson(
    asJson({
      advice: result.advice,
      counts: cut.counts,
      engine: result.engine,
      independence: result.independence,
      seed: result.seed,
      structure: result.structure,
    }),
  );
}

/** Interfaces have no index signature, so that JSON has to be said to be JSON once. */
function asJson(value: object): JsonValue {
  return value as JsonValue;
}

function repeatsIn(result: AnalysisResult): boolean {
  return result.structure.subjects_with_repeats > 0;
}

function bySubject(residuals: readonly Residual[]): OwnResiduals[] {
  const subjects = new Map<string, number[]>();
  for (const { subject, residual } of residuals) {
    const own = subjects.get(subject) ?? [];
    own.push(residual);
    subjects.set(subject, own);
  }
  return [...subjects].map(([code, own]) => ({
    code,
    mean: own.reduce((sum, one) => sum + one, 0) / own.length,
    residuals: own,
  }));
}

function answer<T extends object>(work: () => T): Answer<T> {
  try {
    return { ok: true, ...work() };
  } catch (error) {
    if (error instanceof StatsError) {
      return { ok: false, code: error.code, params: { ...error.parameters } };
    }
    throw error;
  }
}
