/** One subject, whole: cord, visits, readings with their revisions and where they came from. */
import type { EntityManager } from 'typeorm';
import { Measure, Site, Subject } from '../../../database/entities/index.ts';
import type { ReadingView, SubjectDetail, VisitView } from '../../contracts/subjects.ts';
import { Problem } from '../../http/problems.ts';
import { addDays, dayInZone } from '../cuts/days.ts';
import { readReadings } from '../readings/read-readings.ts';
import { buildCord, cordView, type Knot } from './cord.ts';
import { readLoggedVisits, readStudyPlan } from './cord-source.ts';
import type { SubjectScope } from './list.ts';

/** @throws Problem `not_found`, in the same words for a subject of another site or study */
export async function readSubject(
  manager: EntityManager,
  scope: SubjectScope,
  uid: string,
): Promise<SubjectDetail> {
  const { studyId, siteIds, now } = scope;
  const subject = await manager.getRepository(Subject).findOneBy({ studyId, uid });
  if (!subject || (siteIds !== null && !siteIds.includes(subject.siteId))) {
    throw new Problem('not_found');
  }
  const site = await manager.getRepository(Site).findOneByOrFail({ id: subject.siteId });
  const plan = await readStudyPlan(manager, studyId);
  const logged = await readLoggedVisits(manager, [subject.id], plan.measuresAtVisits);
  const cord = buildCord(
    subject,
    plan.planned,
    logged.get(subject.id) ?? [],
    dayInZone(now, site.timeZone),
    plan.closingDays,
  );
  const readings = await readReadings(manager, subject.id);
  const facts = await readVisitFacts(manager, subject.id);
  const measures = await manager
    .getRepository(Measure)
    .find({ where: { studyId }, order: { position: 'ASC' } });
  return {
    id: subject.uid,
    code: subject.code,
    site: { code: site.code, name: site.name, timeZone: site.timeZone },
    consentVersion: subject.consentVersion,
    consentDate: subject.consentDate,
    enrolmentDate: subject.enrolmentDate,
    baselineDate: subject.baselineDate,
    state: subject.state,
    stateDate: subject.stateDate,
    stateReason: subject.stateReason,
    version: subject.version,
    cord: cordView(cord),
    visits: cord.visits.map((knot) => visitView(knot, subject.baselineDate, facts, readings)),
    once: readings.get(null) ?? [],
    measures: measures.map((measure) => ({
      shortName: measure.shortName,
      label: measure.label,
      unit: measure.unit,
      decimals: measure.decimals,
      nature: measure.nature,
      per: measure.per,
      plausibleLow: measure.plausibleLow,
      plausibleHigh: measure.plausibleHigh,
      choices: measure.choices,
    })),
  };
}

interface VisitFacts {
  id: string;
  date: string | null;
  date_precision: VisitView['datePrecision'];
  contact_mode: string | null;
  unscheduled_reason: string | null;
  missed_reason: string | null;
  missed_text: string | null;
  import_uid: string | null;
  file_name: string | null;
  logged_by: string;
  created_at: Date;
}

async function readVisitFacts(
  manager: EntityManager,
  subjectId: string,
): Promise<Map<string, VisitFacts>> {
  const rows: VisitFacts[] = await manager.query(
    `SELECT v.id, v.date, v.date_precision, v.contact_mode, v.unscheduled_reason, v.missed_reason,
            v.missed_text, i.uid AS import_uid, i.file_name, a.name AS logged_by, v.created_at
       FROM visit v
       JOIN account a ON a.id = v.created_by
       LEFT JOIN import i ON i.id = v.import_id
      WHERE v.subject_id = $1`,
    [subjectId],
  );
  return new Map(rows.map((row) => [row.id, row]));
}

function visitView(
  { visitKey, ...knot }: Knot,
  baselineDate: string | null,
  facts: ReadonlyMap<string, VisitFacts>,
  readings: ReadonlyMap<string | null, ReadingView[]>,
): VisitView {
  const held = visitKey === null ? undefined : facts.get(visitKey);
  const dateOf = (day: number | null) =>
    baselineDate === null || day === null ? null : addDays(baselineDate, day);
  return {
    ...knot,
    date: held?.date ?? null,
    datePrecision: held?.date_precision ?? 'day',
    targetDate: dateOf(knot.targetDay),
    windowFromDate: dateOf(knot.windowFrom),
    windowToDate: dateOf(knot.windowTo),
    contactMode: held?.contact_mode ?? null,
    unscheduledReason: held?.unscheduled_reason ?? null,
    missedReason: held?.missed_reason ?? null,
    missedText: held?.missed_text ?? null,
    fromImport:
      held?.import_uid && held.file_name !== null
        ? { id: held.import_uid, fileName: held.file_name }
        : null,
    loggedBy: held?.logged_by ?? null,
    loggedAt: held?.created_at.toISOString() ?? null,
    readings: visitKey === null ? [] : (readings.get(visitKey) ?? []),
  };
}
