/** Pieces that many contracts share. */
import { z } from 'zod';

/** Duties of a membership in one study. The administrator is no member, so stands apart. */
export const studyRoles = [
  'owner',
  'coordinator',
  'monitor',
  'analyst',
  'unblinded statistician',
  'board member',
  'safety officer',
] as const;
export const studyRoleSchema = z.enum(studyRoles);
export type StudyRole = z.infer<typeof studyRoleSchema>;

/** An opaque id, as it stands in addresses. */
export const uidSchema = z.uuid();

/** A moment, in UTC. */
export const momentSchema = z.iso.datetime();

/** A calendar day without a zone. */
export const daySchema = z.iso.date();

/** One page of a list. */
export const pageQuerySchema = z.object({
  page: z.coerce.number().int().min(1).max(1_000_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
});
export const directionSchema = z.enum(['asc', 'desc']);

/** A time zone of the IANA list, such as `Europe/Zurich`. */
export const timeZoneSchema = z
  .string()
  .max(64)
  .refine(isTimeZone, 'Choose a time zone of the list.');

function isTimeZone(name: string): boolean {
  try {
    return new Intl.DateTimeFormat('en-GB', { timeZone: name }).resolvedOptions().timeZone !== '';
  } catch (error) {
    if (error instanceof RangeError) return false;
    throw error;
  }
}
