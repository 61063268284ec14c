/** Accounts and the security log: the administrator's two places. */
import { z } from 'zod';
import { emailSchema } from './auth.ts';
import { daySchema, directionSchema, momentSchema, pageQuerySchema, uidSchema } from './common.ts';

export const accountStates = ['active', 'disabled'] as const;

export const accountSchema = z.object({
  id: uidSchema,
  email: z.string(),
  name: z.string(),
  administrator: z.boolean(),
  state: z.enum(accountStates),
  /** A temporary password waits to be changed. */
  mustChangePassword: z.boolean(),
  createdAt: momentSchema,
  disabledAt: momentSchema.nullable(),
  lastSeenAt: momentSchema.nullable(),
  version: z.number().int(),
});
export type AccountView = z.infer<typeof accountSchema>;

export const accountListQuerySchema = pageQuerySchema.extend({
  sort: z.enum(['name', 'email', 'createdAt', 'lastSeenAt', 'state']).default('name'),
  direction: directionSchema.default('asc'),
  /** Part of a name or address. */
  text: z.string().trim().max(120).optional(),
  state: z.enum(accountStates).optional(),
  kind: z.enum(['member', 'administrator']).optional(),
});
export type AccountListQuery = z.infer<typeof accountListQuerySchema>;
export const accountListSchema = z.object({
  rows: z.array(accountSchema),
  total: z.number().int(),
});

export const createAccountRequestSchema = z.object({
  email: emailSchema,
  name: z.string().trim().min(1).max(120),
  /** An administrator holds no membership anywhere. */
  administrator: z.boolean(),
});
export type CreateAccountRequest = z.infer<typeof createAccountRequestSchema>;

/** The temporary password is answered this once and kept nowhere in clear. */
export const issuedAccountSchema = z.object({
  account: accountSchema,
  temporaryPassword: z.string(),
  /** Whether a letter without the password goes to the person. */
  letterSent: z.boolean(),
});
export type IssuedAccount = z.infer<typeof issuedAccountSchema>;

export const accountActRequestSchema = z.object({
  version: z.number().int(),
  reason: z.string().trim().min(5).max(500),
});
export type AccountActRequest = z.infer<typeof accountActRequestSchema>;

export const securityActions = [
  'sign-in accepted',
  'sign-in refused',
  'sign-in throttled',
  'signed out',
  'session ended',
  'refresh token reused',
  'password changed',
  'password refused',
  'account created',
  'account disabled',
  'account enabled',
  'account reset',
  'preferences changed',
] as const;
export const securityActionSchema = z.enum(securityActions);

export const securityEntrySchema = z.object({
  /** Number in the chain of the installation. */
  number: z.number().int(),
  at: momentSchema,
  action: z.string(),
  /** Who did it; null where nobody was signed in. */
  by: z.string().nullable(),
  /** Whose account it is about; null where the address belongs to no account. */
  about: z.string().nullable(),
  /** A keyed fingerprint of the network address: equal ones are the same address. */
  address: z.string().nullable(),
  reason: z.string().nullable(),
  hash: z.string(),
});
export type SecurityEntry = z.infer<typeof securityEntrySchema>;

export const securityLogFilterSchema = z.object({
  action: securityActionSchema.optional(),
  /** Part of the name of who did it or whom it is about. */
  text: z.string().trim().max(120).optional(),
  from: daySchema.optional(),
  until: daySchema.optional(),
  direction: directionSchema.default('desc'),
});
export type SecurityLogFilter = z.infer<typeof securityLogFilterSchema>;
export const securityLogQuerySchema = securityLogFilterSchema.extend(pageQuerySchema.shape);
export type SecurityLogQuery = z.infer<typeof securityLogQuerySchema>;
export const securityLogSchema = z.object({
  rows: z.array(securityEntrySchema),
  total: z.number().int(),
});
