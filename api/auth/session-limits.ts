/** When a session ends by itself. */
import type { SessionLimits } from '../contracts/auth.ts';

export const IDLE_MINUTES = 20;
export const ABSOLUTE_HOURS = 12;

export interface SessionTimes {
  lastSeenAt: Date;
  absoluteExpiresAt: Date;
  revokedAt: Date | null;
  disabledAt: Date | null;
}

export type SessionEnd = 'signed out' | 'account closed' | '12 hours' | '20 minutes without use';

/** Null while the session lives. */
export function endOf(session: SessionTimes, now: Date): SessionEnd | null {
  if (session.revokedAt) return 'signed out';
  if (session.disabledAt) return 'account closed';
  if (now.getTime() >= session.absoluteExpiresAt.getTime()) return '12 hours';
  const idle = now.getTime() - session.lastSeenAt.getTime();
  return idle >= IDLE_MINUTES * 60_000 ? '20 minutes without use' : null;
}

export function limitsView(accessExpiresAt: Date, absoluteExpiresAt: Date): SessionLimits {
  return {
    accessExpiresAt: accessExpiresAt.toISOString(),
    absoluteExpiresAt: absoluteExpiresAt.toISOString(),
    idleMinutes: IDLE_MINUTES,
  };
}
