/** The independence check, the lock on the ordinary fit, fits, and the records they leave. */
import { z } from 'zod';
import {
  adviceSchema,
  analysisResultSchema,
  independenceSchema,
  structureSchema,
} from './analysis-result.ts';
import { cutMeasureSchema, cutSummarySchema } from './cuts.ts';

/** What a specification is made of, beside its cut. Weeks are days divided by seven. */
export const specificationInputSchema = z.object({
  measure: z.string().min(1),
  axis: z.enum(['since_baseline', 'planned_day']),
  unit: z.enum(['days', 'weeks']),
  /** Groups are offered only in a study that is not masked. */
  group: z.boolean(),
});
export type SpecificationInput = z.infer<typeof specificationInputSchema>;

export const specificationSchema = specificationInputSchema.extend({
  sha256: z.string(),
  /** "Specification 4 of this measure on this cut", counted over everyone. */
  number: z.number().int(),
});

export const openCheckRequestSchema = z.object({ specification: specificationInputSchema });

/** One subject's residuals, in time order; `id` is opaque and goes into addresses. */
const residualsOfSubjectSchema = z.object({
  id: z.string(),
  code: z.string(),
  mean: z.number(),
  residuals: z.array(z.number()),
});

export const acknowledgementSchema = z.object({
  by: z.string(),
  at: z.string(),
  reason: z.string(),
});

export const usedCountsSchema = z.object({
  rows: z.number().int(),
  used: z.number().int(),
  missing: z.number().int(),
  censored: z.number().int(),
  notDone: z.number().int(),
  excluded: z.number().int(),
  /** No place on the time axis: a partial date, or no planned day. */
  noTime: z.number().int(),
  /** No group known, where the specification asks for groups. */
  noGroup: z.number().int(),
});

/** Part 4: stands on the page only, under the stamp; never in an export while the fit is locked. */
export const consequenceSchema = z.object({
  coefficient: z.string(),
  estimate: z.number(),
  seOrdinary: z.number().nullable(),
  seRobust: z.number().nullable(),
  ratio: z.number().nullable(),
  moulton: z.number().nullable(),
  pOrdinary: z.number().nullable(),
  pRobust: z.number().nullable(),
  dfRobust: z.number().nullable(),
  ordinaryErrorIs: z.enum(['too small', 'too large', 'about right', 'unknown']),
});

export const checkSchema = z.object({
  specification: specificationSchema,
  cut: cutSummarySchema,
  measure: cutMeasureSchema,
  counts: usedCountsSchema,
  engine: z.string(),
  seed: z.number().int(),
  structure: structureSchema,
  independence: independenceSchema,
  consequences: z.array(consequenceSchema),
  observed: z.array(residualsOfSubjectSchema),
  dealt: z.array(residualsOfSubjectSchema),
  advice: z.array(adviceSchema),
  /** `count`: a straight line through counts. `censored`: readings beyond a limit are left out. */
  cautions: z.array(z.object({ code: z.enum(['count', 'censored']) })),
  /** Whether an ordinary straight line is locked for this person, and what opened it. */
  lock: z.object({ locked: z.boolean(), acknowledgement: acknowledgementSchema.nullable() }),
});
export type CheckView = z.infer<typeof checkSchema>;

export const acknowledgeRequestSchema = z.object({
  specification: specificationInputSchema,
  reason: z.string().trim().min(20, 'Write at least 20 characters.').max(2000),
});

export const purposes = ['planned', 'exploratory'] as const;
export const fits = ['pooled', 'ordinary'] as const;

export const runFitRequestSchema = z.object({
  specification: specificationInputSchema,
  fit: z.enum(fits),
  /** Asked before the result is seen; nothing preselected. */
  purpose: z.enum(purposes),
});
export type RunFitRequest = z.infer<typeof runFitRequestSchema>;

export const signatureSchema = z.object({
  name: z.string(),
  at: z.string(),
  zone: z.string(),
  meaning: z.string(),
  contentSha256: z.string(),
  /** False where the content no longer hashes to what was signed. */
  valid: z.boolean(),
});

export const recordSummarySchema = z.object({
  id: z.string(),
  cut: z.object({
    id: z.string(),
    number: z.number().int(),
    name: z.string(),
    visitCutoff: z.string(),
  }),
  measure: cutMeasureSchema,
  specification: specificationSchema,
  fit: z.enum(fits),
  purpose: z.enum(purposes),
  by: z.string(),
  at: z.string(),
  engine: z.string(),
  seed: z.number().int(),
  contentSha256: z.string(),
  /** "independence not met" on everything that comes from an ordinary fit of repeated readings. */
  stamp: z.string().nullable(),
  headline: z.object({
    estimate: z.number().nullable(),
    lower: z.number().nullable(),
    upper: z.number().nullable(),
    df: z.number().nullable(),
    subjects: z.number().int(),
    readings: z.number().int(),
  }),
  signed: z.boolean(),
});
export type RecordSummary = z.infer<typeof recordSummarySchema>;

/** What the spaghetti plot draws; times on the axis and unit of the specification. */
export const pictureSchema = z.object({
  subjects: z.array(
    z.object({
      id: z.string(),
      code: z.string(),
      group: z.string().nullable(),
      readings: z.array(z.object({ time: z.number(), value: z.number(), visit: z.string() })),
      /** Set where follow-up ended early: dropouts are marked. */
      ended: z.object({ word: z.string(), time: z.number().nullable() }).nullable(),
    }),
  ),
  visits: z.array(z.object({ name: z.string(), time: z.number(), n: z.number().int() })),
  /** The line of the fit with its band, one run of points a group; ordinary fits carry ordinary bands. */
  band: z.array(
    z.object({
      group: z.string().nullable(),
      points: z.array(
        z.object({
          time: z.number(),
          estimate: z.number(),
          lower: z.number().nullable(),
          upper: z.number().nullable(),
          df: z.number().nullable(),
          /** Subjects with a reading at or after this time. */
          remaining: z.number().int(),
        }),
      ),
    }),
  ),
});

export const recordDetailSchema = recordSummarySchema.extend({
  counts: usedCountsSchema,
  cutSha256: z.string(),
  acknowledgement: acknowledgementSchema.nullable(),
  result: analysisResultSchema,
  picture: pictureSchema,
  signatures: z.array(signatureSchema),
  mayBeSignedByMe: z.boolean(),
});
export type RecordDetail = z.infer<typeof recordDetailSchema>;

export const recordListQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
  sort: z.enum(['at', 'measure', 'cut', 'specification', 'fit', 'purpose', 'by']).default('at'),
  direction: z.enum(['asc', 'desc']).default('desc'),
  measure: z.string().optional(),
  cut: z.string().optional(),
  fit: z.enum(fits).optional(),
  purpose: z.enum(purposes).optional(),
  signed: z.enum(['yes', 'no']).optional(),
});
export const recordListSchema = z.object({
  rows: z.array(recordSummarySchema),
  total: z.number().int(),
});

export const signRecordRequestSchema = z.object({
  password: z.string().min(1),
  meaning: z.enum(['I ran this analysis', 'I reviewed this analysis']),
  contentSha256: z.string(),
});
