/** Who holds which duties in one study; the owner's page. */
import { z } from 'zod';
import { emailSchema } from './auth.ts';
import {
  directionSchema,
  momentSchema,
  pageQuerySchema,
  studyRoleSchema,
  uidSchema,
} from './common.ts';

/** One person of the study with all their duties. The id is that of the account. */
export const memberSchema = z.object({
  id: uidSchema,
  name: z.string(),
  email: z.string(),
  roles: z.array(studyRoleSchema).min(1),
  chair: z.boolean(),
  sites: z.array(z.object({ id: uidSchema, code: z.string(), name: z.string() })),
  since: momentSchema,
  disabled: z.boolean(),
  /** Of the person's duties in this study as a whole. */
  version: z.number().int(),
});
export type MemberView = z.infer<typeof memberSchema>;

export const memberListQuerySchema = pageQuerySchema.extend({
  sort: z.enum(['name', 'email', 'role', 'since']).default('name'),
  direction: directionSchema.default('asc'),
  text: z.string().trim().max(120).optional(),
  role: studyRoleSchema.optional(),
});
export type MemberListQuery = z.infer<typeof memberListQuerySchema>;

export const memberListSchema = z.object({
  rows: z.array(memberSchema),
  total: z.number().int(),
  /** What the form offers for a coordinator. */
  sites: z.array(z.object({ id: uidSchema, code: z.string(), name: z.string() })),
});
export type MemberList = z.infer<typeof memberListSchema>;

const duties = {
  roles: z.array(studyRoleSchema).min(1).max(7),
  /** Only for a board member. */
  chair: z.boolean(),
  /** Sites of a coordinator, at least one; empty for every other duty. */
  siteIds: z.array(uidSchema).max(500),
};

export const addMemberRequestSchema = z.object({ email: emailSchema, ...duties });
export type AddMemberRequest = z.infer<typeof addMemberRequestSchema>;

export const changeMemberRequestSchema = z.object({ ...duties, version: z.number().int() });
export type ChangeMemberRequest = z.infer<typeof changeMemberRequestSchema>;

export const removeMemberRequestSchema = z.object({
  version: z.number().int(),
  reason: z.string().trim().min(5).max(500),
});
export type RemoveMemberRequest = z.infer<typeof removeMemberRequestSchema>;
