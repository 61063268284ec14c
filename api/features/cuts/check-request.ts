/** What a request to freeze must hold beyond its form; each fault names its place and the mend. */
import type { CutExclusion, FreezeCutRequest } from '../../contracts/cuts.ts';
import { fillSentence, Problem } from '../../http/problems.ts';
import { cutProblems } from '../../words/cuts.ts';
import { UNSCHEDULED } from './cut-rows.ts';
import { isCalendarDay } from './days.ts';
import type { StudyPlan } from './study-plan.ts';

type ChosenMeasure = StudyPlan['measures'][number];

/** @throws Problem cut_day_invalid, cut_in_future */
export function checkCutoff(visitCutoff: string, plan: StudyPlan): void {
  if (!isCalendarDay(visitCutoff)) {
    throw fault('cut_day_invalid', { day: visitCutoff }, 'visitCutoff');
  }
  if (visitCutoff > plan.today) {
    throw fault('cut_in_future', { day: visitCutoff, today: plan.today }, 'visitCutoff');
  }
}

/** @throws Problem cut_measure_unknown, cut_needs_visit_measure */
export function chosenMeasures(shortNames: readonly string[], plan: StudyPlan): ChosenMeasure[] {
  const byName = new Map(plan.measures.map((measure) => [measure.shortName, measure]));
  const chosen = new Map<string, ChosenMeasure>();
  shortNames.forEach((name, at) => {
    const measure = byName.get(name);
    if (measure === undefined) {
      throw fault('cut_measure_unknown', { measure: name }, `measures.${at}`);
    }
    chosen.set(name, measure);
  });
  const measures = [...chosen.values()];
  if (!measures.some((measure) => measure.per === 'visit')) {
    throw fault('cut_needs_visit_measure', {}, 'measures');
  }
  return measures;
}

/**
 * Reasons go into one cell of the file, on one line, so that the engine's line numbers stay the file's.
 *
 * @throws Problem cut_exclusion_unknown
 */
export function checkedExclusions(
  body: FreezeCutRequest,
  plan: StudyPlan,
): { exclusions: CutExclusion[]; at: Map<string, number> } {
  const visits = new Set([UNSCHEDULED, ...plan.plannedVisits.map((visit) => visit.name)]);
  const at = new Map<string, number>();
  const exclusions = body.exclusions.map((exclusion, index) => {
    if (exclusion.measure !== null && !body.measures.includes(exclusion.measure)) {
      throw unknownIn(index, 'measure', exclusion.measure);
    }
    if (exclusion.visit !== null && !visits.has(exclusion.visit)) {
      throw unknownIn(index, 'visit', exclusion.visit);
    }
    at.set(exclusion.subjectCode, index);
    return { ...exclusion, reason: exclusion.reason.replace(/\s+/g, ' ').trim() };
  });
  return { exclusions, at };
}

/** An exclusion of a subject that the study does not have would silently exclude nothing. */
export function refuseUnknownSubjects(at: Map<string, number>, known: ReadonlySet<string>): void {
  for (const [code, index] of at) {
    if (!known.has(code)) {
      throw unknownIn(index, 'subjectCode', code);
    }
  }
}

function unknownIn(index: number, field: 'subjectCode' | 'measure' | 'visit', value: string) {
  return fault('cut_exclusion_unknown', { value, row: index + 1 }, `exclusions.${index}.${field}`);
}

type CutCode = keyof typeof cutProblems;

/** A refusal that stands at one entry of the form. */
function fault(code: CutCode, params: Record<string, string | number>, path: string): Problem {
  const message = fillSentence(cutProblems[code].detail, params);
  return new Problem(code, params, { errors: [{ path, message }] });
}
