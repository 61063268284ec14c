/** Data cuts: frozen, hashed, never changed. */
import { z } from 'zod';

const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/);

export const cutExclusionSchema = z.object({
  subjectCode: z.string().min(1).max(32),
  /** null: the whole subject. */
  measure: z.string().nullable(),
  /** null: every visit of the subject. */
  visit: z.string().nullable(),
  reason: z.string().trim().min(5).max(500),
});
export type CutExclusion = z.infer<typeof cutExclusionSchema>;

/** Entry time is the moment of freezing; only the visit date is chosen. */
export const freezeCutRequestSchema = z.object({
  name: z.string().trim().min(1).max(80),
  visitCutoff: day,
  measures: z.array(z.string()).min(1),
  exclusions: z.array(cutExclusionSchema).max(500),
  /** Readings gathered before a withdrawal of consent are left out unless a reason stands here. */
  includeWithdrawnReason: z.string().trim().min(5).max(500).nullable(),
});
export type FreezeCutRequest = z.infer<typeof freezeCutRequestSchema>;

export const cutPreviewQuerySchema = z.object({
  visitCutoff: day,
  /** Short names, comma-separated. */
  measures: z.string().min(1),
});
export const cutPreviewSchema = z.object({
  rows: z.number().int(),
  subjects: z.number().int(),
  readings: z.number().int(),
  late: z.number().int(),
  pending: z.number().int(),
  withdrawnReadings: z.number().int(),
  withdrawnSubjects: z.number().int(),
  lateDays: z.number().int(),
});
export type CutPreview = z.infer<typeof cutPreviewSchema>;

export const cutMeasureSchema = z.object({
  shortName: z.string(),
  label: z.string(),
  unit: z.string().nullable(),
  nature: z.enum(['continuous', 'positive', 'count', 'yes_no', 'choice']),
  per: z.enum(['visit', 'subject']),
  decimals: z.number().int(),
});
export type CutMeasure = z.infer<typeof cutMeasureSchema>;

export const cutSummarySchema = z.object({
  id: z.string(),
  number: z.number().int(),
  name: z.string(),
  visitCutoff: z.string(),
  enteredUntil: z.string(),
  frozenAt: z.string(),
  frozenBy: z.string(),
  measures: z.array(cutMeasureSchema),
  rows: z.number().int(),
  subjects: z.number().int(),
  late: z.number().int(),
  pending: z.number().int(),
  sha256: z.string(),
});
export type CutSummary = z.infer<typeof cutSummarySchema>;

export const cutListQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
  sort: z
    .enum(['number', 'name', 'visitCutoff', 'rows', 'late', 'pending', 'frozenAt'])
    .default('number'),
  direction: z.enum(['asc', 'desc']).default('desc'),
  text: z.string().max(80).optional(),
});
export const cutListSchema = z.object({ rows: z.array(cutSummarySchema), total: z.number().int() });

/** Counts of rows by key (subject, visit, replicate) against another cut. */
export const cutDifferenceSchema = z.object({
  against: z.object({ id: z.string(), number: z.number().int(), name: z.string() }),
  added: z.number().int(),
  changed: z.number().int(),
  gone: z.number().int(),
});

export const cutDetailSchema = cutSummarySchema.extend({
  exclusions: z.array(cutExclusionSchema),
  includeWithdrawnReason: z.string().nullable(),
  withdrawnLeftOut: z.object({ subjects: z.number().int(), readings: z.number().int() }),
  /** Against the cut before it; null for the first. */
  difference: cutDifferenceSchema.nullable(),
  /** The first thousand of each; `late` and `pending` tell how many there are. */
  lateRows: z.array(
    z.object({
      subjectCode: z.string(),
      visit: z.string(),
      measure: z.string(),
      visitDate: z.string(),
      enteredAt: z.string(),
      days: z.number().int(),
    }),
  ),
  pendingRows: z.array(
    z.object({ subjectCode: z.string(), visit: z.string(), windowClosed: z.string() }),
  ),
  /** Whether groups may be chosen: only in a study that is not masked. */
  groups: z.array(z.string()),
});
export type CutDetail = z.infer<typeof cutDetailSchema>;

/** What the freeze form offers. */
export const cutChoicesSchema = z.object({
  measures: z.array(cutMeasureSchema),
  today: z.string(),
  masked: z.boolean(),
  lateDays: z.number().int(),
});
export type CutChoices = z.infer<typeof cutChoicesSchema>;
