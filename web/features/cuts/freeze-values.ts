/** What the form that freezes a cut holds, and when it can be sent. */
import { z } from 'zod';
import { freezeCutRequestSchema } from '../../../api/contracts/cuts.ts';
import { words } from '../../words/en.ts';

const exclusion = z.object({
  subjectCode: z.string().trim().min(1).max(32),
  /** Empty in the form: all measures, every visit. */
  measure: z.string(),
  visit: z.string(),
  reason: z.string().trim().min(5).max(500),
});
export const freezeFormSchema = z
  .object({
    ...freezeCutRequestSchema.pick({ name: true, visitCutoff: true, measures: true }).shape,
    exclusions: z.array(exclusion).max(500),
    withdrawn: z.enum(['leave out', 'include']),
    includeReason: z.string().trim(),
  })
  .refine(({ withdrawn, includeReason }) => withdrawn !== 'include' || includeReason.length >= 5, {
    path: ['includeReason'],
    message: words.cuts.needsReason,
  });

export type FreezeValues = z.infer<typeof freezeFormSchema>;
