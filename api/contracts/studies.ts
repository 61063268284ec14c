/** The studies a person belongs to. */
import { z } from 'zod';
import { myMembershipSchema } from './auth.ts';

export const studyListSchema = z.object({ rows: z.array(myMembershipSchema) });
