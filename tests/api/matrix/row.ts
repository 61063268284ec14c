/** One line of the table of routes: who may, a valid request, and the rows that tell what it did. */
import type { StudyRole } from '../../../api/contracts/common.ts';
import type { Who } from './who.ts';
import type { World } from './world.ts';

export type { Who } from './who.ts';

export interface MatrixRequest {
  /** Address with its ids filled in; whoever tries it sends the same one. */
  path: string;
  body?: object;
  /** A multipart upload instead of a body. */
  upload?: { fields: Record<string, string>; name: string; content: string };
  headers?: Record<string, string>;
}

export interface MatrixRow {
  /** Method and path as the API description spells them: `POST /api/studies/{study}/members`. */
  route: string;
  /** As under `x-roles` of the description. */
  may: readonly (StudyRole | 'administrator' | 'signed in' | 'public')[];
  /** Status for those who may. */
  status: number | ((who: Who) => number);
  /**
   * Makes a request that is valid now; asked for once before the refused tries and once for each who may.
   * @param who null for the refused tries
   */
  prepare: (world: World, who: Who | null) => Promise<MatrixRequest>;
  /** Reads what the route changes; left out for a route that changes nothing. */
  stored?: (world: World) => Promise<unknown>;
  /** A `signed in` route about something of one's own: for others it does not exist. */
  own?: boolean;
}

export function mayCall(row: MatrixRow, who: Who): boolean {
  if (row.may.includes('public')) return true;
  if (who === 'anonymous') return false;
  if (row.may.includes('signed in')) return true;
  return who !== 'stranger' && row.may.includes(who);
}

export const statusFor = (row: MatrixRow, who: Who): number =>
  typeof row.status === 'function' ? row.status(who) : row.status;

/** What a refusal looks like for the one who tries. */
export function refusalOf(row: MatrixRow, who: Who): { status: number; code: string } {
  if (who === 'anonymous') return { status: 401, code: 'not_signed_in' };
  if (row.may.includes('administrator')) return { status: 403, code: 'administrator_only' };
  // A study of others does not exist, for an administrator neither.
  if (who === 'stranger' || who === 'administrator') return { status: 404, code: 'not_found' };
  return { status: 403, code: 'role_refused' };
}
