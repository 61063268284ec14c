/** Long work with progress, followed over server-sent events. */
import { z } from 'zod';
import { momentSchema, uidSchema } from './common.ts';

export const jobStates = ['waiting', 'running', 'done', 'failed', 'cancelled'] as const;

export const jobSchema = z.object({
  id: uidSchema,
  kind: z.string(),
  state: z.enum(jobStates),
  done: z.number().int(),
  total: z.number().int().nullable(),
  /** The id of what the work is about, such as an import. */
  subject: uidSchema.nullable(),
  cancelRequested: z.boolean(),
  problem: z
    .object({
      code: z.string(),
      params: z.record(z.string(), z.union([z.string(), z.number()])),
    })
    .nullable(),
  createdAt: momentSchema,
  finishedAt: momentSchema.nullable(),
});
export type JobView = z.infer<typeof jobSchema>;
