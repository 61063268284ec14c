/** Which subject lies under the pointer. */
import { type Quadtree, quadtree } from 'd3';
import { type Layout, pathOf } from './layout.ts';
import type { DrawAs, SpaghettiSubject } from './types.ts';

type Spot = { x: number; y: number; id: string };

const REACH = 24;
/** Past this many readings only the readings themselves can be hit, not the lines between them. */
const FINE_UNTIL = 20_000;

/** Spots along every path, so that a long line can be hit between its readings too. */
export function spotsOf(
  subjects: readonly SpaghettiSubject[],
  as: DrawAs,
  layout: Layout,
): Quadtree<Spot> {
  const readings = subjects.reduce((sum, subject) => sum + subject.readings.length, 0);
  const every = readings > FINE_UNTIL ? Number.POSITIVE_INFINITY : 14;
  const spots: Spot[] = [];
  for (const subject of subjects) {
    let before: { x: number; y: number } | null = null;
    for (const point of pathOf(subject, as)) {
      const here = { x: layout.x(point.time), y: layout.y(point.value) };
      if (before) {
        const length = Math.hypot(here.x - before.x, here.y - before.y);
        const parts = Math.max(1, Math.floor(length / every));
        for (let part = 1; part < parts; part += 1) {
          const share = part / parts;
          spots.push({
            id: subject.id,
            x: before.x + (here.x - before.x) * share,
            y: before.y + (here.y - before.y) * share,
          });
        }
      }
      spots.push({ id: subject.id, ...here });
      before = here;
    }
  }
  return quadtree<Spot>(
    spots,
    (spot) => spot.x,
    (spot) => spot.y,
  );
}

export function nearestIn(spots: Quadtree<Spot>, x: number, y: number): string | null {
  return spots.find(x, y, REACH)?.id ?? null;
}
