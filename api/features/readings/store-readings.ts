/** Takes the readings of a visit, or those taken once per subject, and keeps them. */
import { In, IsNull } from 'typeorm';
import { Measure, Reading } from '../../../database/entities/index.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyAct } from '../subjects/study-act.ts';
import { checkContent, type ReadingCells, type ReadingInput } from './check-content.ts';

export interface NewReading extends ReadingInput {
  /** Short name of the measure. */
  measure: string;
  /** 1 when left out. */
  replicate?: number;
  /** Why a value outside the plausible range stands; it is refused without one. */
  explanation?: string | null;
}

export interface ReadingPlace {
  subjectId: string;
  /** Where readings taken at visits go; null refuses them. */
  visitId: string | null;
}

/** What the audit entry of the act says of each reading. */
export interface StoredReading extends ReadingCells {
  measure: string;
  replicate: number;
}

/**
 * All of them are kept, or the first fault is told and none is.
 *
 * @throws Problem `reading_…`, naming the measure
 */
export async function storeReadings(
  act: StudyAct,
  place: ReadingPlace,
  readings: readonly NewReading[],
): Promise<StoredReading[]> {
  if (readings.length === 0) {
    return [];
  }
  const { manager } = act.tx;
  const measures = await manager.getRepository(Measure).findBy({
    studyId: act.study.id,
    shortName: In(readings.map((reading) => reading.measure)),
  });
  const byName = new Map(measures.map((measure) => [measure.shortName, measure]));
  const seen = new Set<string>();
  const rows = readings.map((reading) => {
    const measure = byName.get(reading.measure);
    if (!measure || (measure.per === 'visit' && place.visitId === null)) {
      throw new Problem('reading_measure_unknown', { measure: reading.measure });
    }
    const replicate = reading.replicate ?? 1;
    const key = `${measure.id} ${replicate}`;
    if (seen.has(key)) {
      throw new Problem('reading_twice', { measure: measure.label, replicate });
    }
    seen.add(key);
    return { measure, replicate, ...takeContent(measure, reading) };
  });

  await refuseHeld(act, place, rows);
  await manager.getRepository(Reading).insert(
    rows.map(({ measure, replicate, cells, explanation }) => ({
      studyId: act.study.id,
      subjectId: place.subjectId,
      visitId: measure.per === 'visit' ? place.visitId : null,
      measureId: measure.id,
      replicate,
      ...cells,
      explanation,
      enteredAt: act.now,
      enteredBy: act.accountId,
    })),
  );
  return rows.map(({ measure, replicate, cells }) => ({
    measure: measure.shortName,
    replicate,
    ...cells,
  }));
}

/** @throws Problem naming the fault; `reading_implausible` where an explanation is wanted */
export function takeContent(
  measure: Measure,
  input: ReadingInput & { explanation?: string | null },
): { cells: ReadingCells; explanation: string | null } {
  const checked = checkContent(measure, input);
  if (!checked.ok) {
    throw new Problem(checked.fault, checked.params);
  }
  const explanation = input.explanation?.trim() || null;
  if (checked.implausible && explanation === null) {
    throw new Problem('reading_implausible', {
      measure: measure.label,
      given: checked.cells.value ?? '',
      low: measure.plausibleLow ?? '',
      high: measure.plausibleHigh ?? '',
    });
  }
  return { cells: checked.cells, explanation };
}

/** A visit that is new holds nothing yet, but what is taken once per subject may be held already. */
async function refuseHeld(
  act: StudyAct,
  place: ReadingPlace,
  rows: readonly { measure: Measure; replicate: number }[],
): Promise<void> {
  const repository = act.tx.manager.getRepository(Reading);
  for (const { measure, replicate } of rows) {
    if (measure.per !== 'subject') {
      continue;
    }
    const held = await repository.existsBy({
      subjectId: place.subjectId,
      visitId: IsNull(),
      measureId: measure.id,
      replicate,
    });
    if (held) {
      throw new Problem('reading_held', { measure: measure.label, replicate });
    }
  }
}
