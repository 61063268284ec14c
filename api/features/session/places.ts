/** Which pages work for which duty. A person with several duties gets their union. */
import { type Place, places } from '../../contracts/auth.ts';
import type { StudyRole } from '../../contracts/common.ts';

const PLACES: Record<StudyRole, readonly Place[]> = {
  owner: ['members', 'setup', 'subjects', 'cuts', 'records'],
  coordinator: ['subjects', 'import'],
  monitor: ['subjects'],
  analyst: ['cuts', 'check', 'records'],
  // Their pages come with the releases and the alerts; until then they have none.
  'unblinded statistician': [],
  'board member': [],
  'safety officer': [],
};

export const administratorPlaces: readonly Place[] = ['accounts', 'security-log'];

export function placesOf(roles: readonly StudyRole[]): Place[] {
  const first = roles[0];
  // One duty keeps its own order; the union of several takes the common one.
  if (roles.length === 1 && first) return [...PLACES[first]];
  const open = new Set(roles.flatMap((role) => PLACES[role]));
  return places.filter((place) => open.has(place));
}
