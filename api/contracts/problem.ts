/** The error document of every refused request (RFC 9457), with a code for the catalogue of the pages. */
import { z } from 'zod';

export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  code: z.string(),
  /** What fills the sentence of the code. */
  params: z.record(z.string(), z.union([z.string(), z.number()])),
  /** Which entries are at fault: dotted path in the body or query, and the mend. */
  errors: z.array(z.object({ path: z.string(), message: z.string() })),
  /** The number that support can find this request by. */
  requestId: z.string(),
});
export type ProblemDocument = z.infer<typeof problemSchema>;
