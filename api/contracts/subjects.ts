/** Subjects with their cords, visits and readings: the list, one subject, and finding one by code. */
import { z } from 'zod';
import { daySchema, directionSchema, momentSchema, pageQuerySchema, uidSchema } from './common.ts';
import { measureNatures } from './setup.ts';

export const subjectStates = [
  'screening',
  'screen failed',
  'enrolled',
  'completed',
  'stopped the intervention but followed',
  'withdrawn from visits',
  'consent withdrawn',
  'lost to follow-up',
  'died',
] as const;
export const subjectStateSchema = z.enum(subjectStates);
export type SubjectState = z.infer<typeof subjectStateSchema>;

/** States of a planned visit. A visit outside the plan is always `unscheduled`. */
export const visitStates = [
  'upcoming',
  'open',
  'closing',
  'overdue',
  'done',
  'partly done',
  'missed',
  'unscheduled',
] as const;
export const visitStateSchema = z.enum(visitStates);
export type VisitState = z.infer<typeof visitStateSchema>;

/** A knot of the cord, planned or unscheduled, in order of time. Days count from baseline. */
export const cordVisitSchema = z.object({
  /** Of the logged visit; null while nothing is logged. */
  id: uidSchema.nullable(),
  /** null: unscheduled. */
  plannedVisitId: uidSchema.nullable(),
  name: z.string(),
  state: visitStateSchema,
  targetDay: z.number().int().nullable(),
  /** First and last day of the window, both in it. */
  windowFrom: z.number().int().nullable(),
  windowTo: z.number().int().nullable(),
  /** The day the visit took place; null where it did not, or the date is partial. */
  day: z.number().int().nullable(),
  outOfWindow: z.boolean(),
  /** No longer due, because follow-up had ended before its window closed. */
  afterEnd: z.boolean(),
});
export type CordVisit = z.infer<typeof cordVisitSchema>;

/** What the cord component draws. */
export const cordSchema = z.object({
  /** Days since baseline at the subject's site; null without a baseline date. */
  today: z.number().int().nullable(),
  /** Follow-up that has ended, completed included: the word, and its day where a date is known. */
  end: z.object({ word: subjectStateSchema, day: z.number().int().nullable() }).nullable(),
  visits: z.array(cordVisitSchema),
});
export type Cord = z.infer<typeof cordSchema>;

const siteOfSubjectSchema = z.object({ code: z.string(), name: z.string() });

export const subjectRowSchema = z.object({
  id: uidSchema,
  code: z.string(),
  site: siteOfSubjectSchema,
  state: subjectStateSchema,
  stateDate: daySchema.nullable(),
  baselineDate: daySchema.nullable(),
  /** Planned visits that took place, wholly or partly. */
  visitsDone: z.number().int(),
  /** Planned visits whose window had opened by today and that were still due then. */
  visitsDue: z.number().int(),
  lastVisit: daySchema.nullable(),
  cord: cordSchema,
});
export type SubjectRow = z.infer<typeof subjectRowSchema>;

const subjectFilterSchema = z.object({
  /** Code of the site. */
  site: z.string().max(32).optional(),
  state: subjectStateSchema.optional(),
  /** A part of the subject's code, without regard to case. */
  text: z.string().trim().max(32).optional(),
  sort: z
    .enum(['code', 'site', 'state', 'baselineDate', 'visitsDone', 'lastVisit'])
    .default('code'),
  direction: directionSchema.default('asc'),
});
export const subjectListQuerySchema = pageQuerySchema.extend(subjectFilterSchema.shape);
export type SubjectListQuery = z.infer<typeof subjectListQuerySchema>;
/** The same rows as a file; all of them. */
export const subjectFileQuerySchema = subjectFilterSchema;
export type SubjectFileQuery = z.infer<typeof subjectFileQuerySchema>;

export const subjectListSchema = z.object({
  rows: z.array(subjectRowSchema),
  /** Rows that pass the filter, and rows this person may see at all. */
  total: z.number().int(),
  totalUnfiltered: z.number().int(),
  /** What the filter offers: sites this person may see. */
  sites: z.array(siteOfSubjectSchema),
});
export type SubjectList = z.infer<typeof subjectListSchema>;

/** Exactly one of value, choice, limit and notDone is set. */
export const readingContentSchema = z.object({
  value: z.number().nullable(),
  /** The code of the choice. */
  choice: z.string().nullable(),
  /** Censored: below or above a limit of quantification. */
  limit: z.object({ sign: z.enum(['<', '>']), value: z.number() }).nullable(),
  notDone: z.string().nullable(),
});
export type ReadingContent = z.infer<typeof readingContentSchema>;

export const readingRevisionSchema = z.object({
  at: momentSchema,
  by: z.string(),
  old: readingContentSchema,
  new: readingContentSchema,
  reason: z.string(),
  reasonText: z.string().nullable(),
});

export const readingViewSchema = readingContentSchema.extend({
  id: uidSchema,
  /** Short name of the measure. */
  measure: z.string(),
  replicate: z.number().int(),
  /** Outside the plausible range. */
  implausible: z.boolean(),
  explanation: z.string().nullable(),
  /** Typed when null, else the import it came with. */
  fromImport: z.object({ id: uidSchema, fileName: z.string() }).nullable(),
  enteredBy: z.string(),
  enteredAt: momentSchema,
  /** Oldest first. */
  revisions: z.array(readingRevisionSchema),
});
export type ReadingView = z.infer<typeof readingViewSchema>;

export const visitViewSchema = cordVisitSchema.extend({
  date: daySchema.nullable(),
  /** A partial date stands as its first possible day. */
  datePrecision: z.enum(['day', 'month', 'year']),
  /** The target and the window as dates; null without a baseline date or plan. */
  targetDate: daySchema.nullable(),
  windowFromDate: daySchema.nullable(),
  windowToDate: daySchema.nullable(),
  contactMode: z.string().nullable(),
  unscheduledReason: z.string().nullable(),
  missedReason: z.string().nullable(),
  missedText: z.string().nullable(),
  fromImport: z.object({ id: uidSchema, fileName: z.string() }).nullable(),
  loggedBy: z.string().nullable(),
  loggedAt: momentSchema.nullable(),
  readings: z.array(readingViewSchema),
});
export type VisitView = z.infer<typeof visitViewSchema>;

export const subjectMeasureSchema = z.object({
  shortName: z.string(),
  label: z.string(),
  unit: z.string().nullable(),
  decimals: z.number().int(),
  nature: z.enum(measureNatures),
  per: z.enum(['visit', 'subject']),
  plausibleLow: z.number().nullable(),
  plausibleHigh: z.number().nullable(),
  choices: z.array(z.object({ code: z.string(), label: z.string() })).nullable(),
});

export const subjectDetailSchema = z.object({
  id: uidSchema,
  code: z.string(),
  site: siteOfSubjectSchema.extend({ timeZone: z.string() }),
  consentVersion: z.string().nullable(),
  consentDate: daySchema.nullable(),
  enrolmentDate: daySchema.nullable(),
  baselineDate: daySchema.nullable(),
  state: subjectStateSchema,
  stateDate: daySchema.nullable(),
  stateReason: z.string().nullable(),
  version: z.number().int(),
  cord: cordSchema,
  /** In order of the cord: logged ones, and planned ones not logged yet. */
  visits: z.array(visitViewSchema),
  /** Readings taken once per subject. */
  once: z.array(readingViewSchema),
  /** In the order of the set-up. */
  measures: z.array(subjectMeasureSchema),
});
export type SubjectDetail = z.infer<typeof subjectDetailSchema>;

export const findSubjectQuerySchema = z.object({ code: z.string().trim().min(1).max(32) });
/** At most ten, the exact code first. */
export const foundSubjectsSchema = z.object({
  rows: z.array(z.object({ id: uidSchema, code: z.string(), site: siteOfSubjectSchema })),
});
export type FoundSubjects = z.infer<typeof foundSubjectsSchema>;
