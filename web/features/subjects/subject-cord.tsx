import type { Cord as CordFacts } from '../../../api/contracts/subjects.ts';
import { Cord } from '../../charts/cord/cord.tsx';
import { cordScale } from '../../charts/cord/geometry.ts';
import type { CordScale, CordVisit } from '../../charts/cord/types.ts';

/** A visit without a row of its own is told apart by its place in the plan. */
function drawable(cord: CordFacts): CordVisit[] {
  return cord.visits
    .filter((visit) => !visit.afterEnd)
    .map((visit, index) => ({ ...visit, id: visit.id ?? visit.plannedVisitId ?? String(index) }));
}

/** One scale for all cords of a list, so that the same place means the same day. */
export function scaleOf(cords: readonly CordFacts[]): CordScale {
  return cordScale(
    cords.map((cord) => ({
      visits: drawable(cord),
      today: cord.today,
      endedAt: cord.end?.day ?? null,
    })),
  );
}

export function SubjectCord({ cord, scale }: { cord: CordFacts; scale: CordScale }) {
  return (
    <Cord
      visits={drawable(cord)}
      today={cord.today}
      endedAt={cord.end?.day ?? null}
      endWord={cord.end?.word ?? null}
      scale={scale}
    />
  );
}
