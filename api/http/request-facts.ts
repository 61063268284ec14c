/** What is known of a request beside the request itself: its number and who sent it. */
import type { Response } from 'express';

/** The account and session behind a request, read anew for each one. */
export interface SignedInPerson {
  /** Inner key. */
  accountId: string;
  accountUid: string;
  email: string;
  name: string;
  administrator: boolean;
  mustChangePassword: boolean;
  sessionId: string;
  sessionUid: string;
  sessionCreatedAt: Date;
  lastSeenAt: Date;
  absoluteExpiresAt: Date;
  /** When the token of this request runs out. */
  accessExpiresAt: Date;
}

interface Facts {
  requestId?: string;
  person?: SignedInPerson;
}

const factsOf = (res: Response): Facts => res.locals as Facts;

export function setRequestId(res: Response, requestId: string): void {
  factsOf(res).requestId = requestId;
}

export function requestIdOf(res: Response): string {
  return factsOf(res).requestId ?? '';
}

export function setPerson(res: Response, person: SignedInPerson): void {
  factsOf(res).person = person;
}

export function personOf(res: Response): SignedInPerson | undefined {
  return factsOf(res).person;
}
