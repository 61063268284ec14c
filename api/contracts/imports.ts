/** Import of a long CSV file: one measure a file, chosen on the page. */
import { z } from 'zod';

export const importStates = [
  'uploaded',
  'checking',
  'checked',
  'applying',
  'applied',
  'nothing new',
  'failed',
  'cancelled',
] as const;

/** Where a value of a new subject comes from: once for all rows, or from a column of the file. */
const fixedOrColumn = z.discriminatedUnion('from', [
  z.object({ from: z.literal('fixed'), value: z.string().trim().min(1).max(64) }),
  z.object({ from: z.literal('column'), column: z.string().min(1) }),
]);
export type FixedOrColumn = z.infer<typeof fixedOrColumn>;

export const dateOrders = ['year-month-day', 'day-month-year', 'month-day-year'] as const;

/** What places a row in time. `visit` names a visit that is logged already. */
const whenSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('date'), column: z.string().min(1), order: z.enum(dateOrders) }),
  z.object({ kind: z.literal('days'), column: z.string().min(1) }),
  z.object({ kind: z.literal('visit'), column: z.string().min(1) }),
]);

export const importMappingSchema = z.object({
  subject: z.string().min(1),
  value: z.string().min(1),
  /** null for a measure taken once per subject. */
  when: whenSchema.nullable(),
  replicate: z.string().min(1).nullable(),
  site: z.string().min(1).nullable(),
  decimal: z.enum(['.', ',']),
  /** null: a row of a subject who is not enrolled is refused. */
  newSubjects: z
    .object({
      site: fixedOrColumn,
      consentVersion: fixedOrColumn,
      consentDate: fixedOrColumn,
      baselineDate: fixedOrColumn,
      order: z.enum(dateOrders),
    })
    .nullable(),
});
export type ImportMapping = z.infer<typeof importMappingSchema>;

export const importColumnSchema = z.object({
  name: z.string(),
  /** The first three values that are not empty. */
  samples: z.array(z.string()).max(3),
});

export const importCountsSchema = z.object({
  rows: z.number().int(),
  /** Rows that would be, or were, written. */
  fresh: z.number().int(),
  refused: z.number().int(),
  /** Rows whose content was applied before. */
  known: z.number().int(),
  /** Among the fresh ones: outside the plausible range. */
  implausible: z.number().int(),
  newSubjects: z.number().int(),
  newVisits: z.number().int(),
  /** Among the new visits: those outside every window. */
  unscheduled: z.number().int(),
});
export type ImportCounts = z.infer<typeof importCountsSchema>;

/** A sentence for the page: a code of the catalogue and what fills it. */
export const messageSchema = z.object({
  code: z.string(),
  params: z.record(z.string(), z.union([z.string(), z.number()])),
});

export const importSchema = z.object({
  id: z.string(),
  measure: z.object({
    id: z.string(),
    shortName: z.string(),
    label: z.string(),
    unit: z.string().nullable(),
  }),
  fileName: z.string(),
  fileSize: z.number().int(),
  fileSha256: z.string(),
  /** Rows below the header. */
  fileRows: z.number().int(),
  state: z.enum(importStates),
  delimiter: z.string(),
  columns: z.array(importColumnSchema),
  mapping: importMappingSchema.nullable(),
  suggestedMapping: importMappingSchema.partial().nullable(),
  counts: importCountsSchema.nullable(),
  explanation: z.string().nullable(),
  keepImplausible: z.boolean().nullable(),
  problem: messageSchema.nullable(),
  uploadedBy: z.string(),
  uploadedAt: z.string(),
  appliedAt: z.string().nullable(),
  /** The job that works on it now, to be followed under /api/jobs/:job/events. */
  jobId: z.string().nullable(),
  version: z.number().int(),
});
export type ImportView = z.infer<typeof importSchema>;

export const importListQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
  sort: z.enum(['uploadedAt', 'fileName', 'measure', 'state']).default('uploadedAt'),
  direction: z.enum(['asc', 'desc']).default('desc'),
  state: z.enum(importStates).optional(),
});
export const importListSchema = z.object({ rows: z.array(importSchema), total: z.number().int() });

/** The fields beside the file in the multipart upload. */
export const uploadFieldsSchema = z.object({ measure: z.string().min(1) });

export const checkImportRequestSchema = z.object({
  mapping: importMappingSchema,
  version: z.number().int(),
});

export const applyImportRequestSchema = z
  .object({
    /** What happens to implausible values: kept with one explanation for the list, or left out. */
    keepImplausible: z.boolean(),
    explanation: z.string().trim().max(2000).nullable(),
    version: z.number().int(),
  })
  .refine((body) => !body.keepImplausible || (body.explanation ?? '').length > 0, {
    path: ['explanation'],
    message: 'Say in one sentence why these values are kept.',
  });

export const importRowsQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
});

export const refusedRowSchema = z.object({
  line: z.number().int(),
  subject: z.string(),
  value: z.string(),
  reason: messageSchema,
});
export const refusedRowsSchema = z.object({
  rows: z.array(refusedRowSchema),
  total: z.number().int(),
});

export const implausibleRowSchema = z.object({
  line: z.number().int(),
  subject: z.string(),
  visit: z.string(),
  value: z.number(),
  plausibleLow: z.number().nullable(),
  plausibleHigh: z.number().nullable(),
});
export const implausibleRowsSchema = z.object({
  rows: z.array(implausibleRowSchema),
  total: z.number().int(),
});

/** Measures and sites that the import page offers to this person. */
export const importChoicesSchema = z.object({
  measures: z.array(
    z.object({
      id: z.string(),
      shortName: z.string(),
      label: z.string(),
      unit: z.string().nullable(),
      nature: z.string(),
      per: z.enum(['visit', 'subject']),
    }),
  ),
  sites: z.array(z.object({ code: z.string(), name: z.string() })),
  plannedVisits: z.array(z.object({ name: z.string(), targetDay: z.number().int() })),
});
