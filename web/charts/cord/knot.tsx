/** The marks of a cord, drawn around (0, 0). Cords and legends draw them with this and nothing else. */

import { CORD } from './geometry.ts';
import type { CordState } from './types.ts';

const INK = 'var(--color-ink)';
const FADED = 'var(--color-faded)';

/** The part of the line that a knot takes out, so that hollow marks are hollow on any ground. */
export function KnotCut({ state }: { state: CordState }) {
  if (state === 'missed')
    return <rect x={-CORD.gap + 1} y={-8} width={2 * CORD.gap - 2} height={16} fill="black" />;
  if (state === 'partly done') return <circle r={4.5} fill="black" />;
  if (state === 'open' || state === 'closing') return <circle r={5} fill="black" />;
  if (state === 'overdue') return <circle r={6} fill="black" />;
  if (state === 'upcoming') return <circle r={3} fill="black" />;
  return null;
}

export function Knot({ state, outOfWindow }: { state: CordState; outOfWindow: boolean }) {
  return (
    <>
      <KnotShape state={state} />
      {outOfWindow && <line y1={-7} y2={-12} stroke={INK} strokeWidth={1.5} />}
    </>
  );
}

function KnotShape({ state }: { state: CordState }) {
  switch (state) {
    case 'done':
      return <circle r={4.5} fill={INK} />;
    case 'partly done':
      return (
        <>
          <circle r={4.5} fill="none" stroke={INK} strokeWidth={1.5} />
          <path d="M0 -4.5 A4.5 4.5 0 0 0 0 4.5 Z" fill={INK} />
        </>
      );
    case 'missed':
      return (
        <path
          d={`M${-CORD.gap + 1} -5 V5 M${CORD.gap - 1} -5 V5`}
          stroke={INK}
          strokeWidth={1.5}
          fill="none"
        />
      );
    case 'open':
      return <circle r={5} fill="none" stroke="var(--color-kelp)" strokeWidth={2} />;
    case 'closing':
      return <circle r={5} fill="none" stroke="var(--color-kelp)" strokeWidth={3} />;
    case 'overdue':
      return (
        <>
          <circle r={6.5} fill="none" stroke="var(--color-stop)" strokeWidth={1.75} />
          <circle r={3} fill="none" stroke="var(--color-stop)" strokeWidth={1.75} />
        </>
      );
    case 'upcoming':
      return <circle r={3} fill="none" stroke={FADED} strokeWidth={1} />;
    case 'unscheduled':
      return <path d="M0 -4.5 L4.5 0 L0 4.5 L-4.5 0 Z" fill={INK} />;
  }
}

/** The blunt end of a cord. */
export function EndCap() {
  return <line y1={-7} y2={7} stroke={INK} strokeWidth={3} />;
}
