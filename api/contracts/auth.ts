/** Signing in, the person's own account and sessions. */
import { z } from 'zod';
import { momentSchema, studyRoleSchema, timeZoneSchema, uidSchema } from './common.ts';

export const emailSchema = z.string().trim().max(254).pipe(z.email());

/** A password as given; whether it is good enough is asked only where one is set. */
const givenPassword = z.string().min(1).max(1024);
export const newPasswordSchema = z.string().min(8).max(1024);

export const signInRequestSchema = z.object({ email: emailSchema, password: givenPassword });
export type SignInRequest = z.infer<typeof signInRequestSchema>;

/** When the session ends at the latest, and after how many idle minutes. */
export const sessionLimitsSchema = z.object({
  accessExpiresAt: momentSchema,
  absoluteExpiresAt: momentSchema,
  idleMinutes: z.number().int(),
});
export type SessionLimits = z.infer<typeof sessionLimitsSchema>;

export const signedInSchema = sessionLimitsSchema.extend({ mustChangePassword: z.boolean() });

/** Pages that work for a role, in the order they stand under the top bar. */
export const places = [
  'subjects',
  'import',
  'cuts',
  'check',
  'records',
  'members',
  'setup',
  'accounts',
  'security-log',
] as const;
export const placeSchema = z.enum(places);
export type Place = z.infer<typeof placeSchema>;

export const myMembershipSchema = z.object({
  study: z.object({
    id: uidSchema,
    name: z.string(),
    shortName: z.string(),
    masked: z.boolean(),
    state: z.enum(['open', 'locked', 'closed']),
  }),
  roles: z.array(studyRoleSchema),
  chair: z.boolean(),
  /** Sites of a coordinator; empty for those who see every site or none. */
  sites: z.array(z.object({ id: uidSchema, code: z.string(), name: z.string() })),
  places: z.array(placeSchema),
});
export type MyMembership = z.infer<typeof myMembershipSchema>;

export const themes = ['system', 'light', 'dark'] as const;

export const meSchema = z.object({
  account: z.object({
    id: uidSchema,
    email: z.string(),
    name: z.string(),
    administrator: z.boolean(),
    mustChangePassword: z.boolean(),
    theme: z.enum(themes),
    timeZone: z.string(),
    version: z.number().int(),
  }),
  /** The id of the session that asks. */
  session: sessionLimitsSchema.extend({ id: uidSchema }),
  memberships: z.array(myMembershipSchema),
  /** Places that belong to no study: those of the administrator. */
  places: z.array(placeSchema),
});
export type Me = z.infer<typeof meSchema>;

/** A field that is left out stays as it is. */
export const changeMeRequestSchema = z.object({
  theme: z.enum(themes).optional(),
  timeZone: timeZoneSchema.optional(),
  version: z.number().int(),
});
export type ChangeMeRequest = z.infer<typeof changeMeRequestSchema>;

export const changePasswordRequestSchema = z.object({
  currentPassword: givenPassword,
  newPassword: newPasswordSchema,
});
export type ChangePasswordRequest = z.infer<typeof changePasswordRequestSchema>;

export const mySessionSchema = z.object({
  id: uidSchema,
  current: z.boolean(),
  createdAt: momentSchema,
  lastSeenAt: momentSchema,
  /** The browser as it named itself, shortened. */
  agent: z.string().nullable(),
});
export const mySessionsSchema = z.object({ rows: z.array(mySessionSchema) });
export type MySessions = z.infer<typeof mySessionsSchema>;
