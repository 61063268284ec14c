/** The legend of the cord, drawn with the marks themselves. */
import { useId } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { CORD } from './geometry.ts';
import { EndCap, Knot, KnotCut } from './knot.tsx';
import type { CordState } from './types.ts';

const words = chartsWords.cord;

type Entry = CordState | 'outOfWindow' | 'ended';
const ALL: readonly Entry[] = [
  'done',
  'partly done',
  'missed',
  'open',
  'closing',
  'overdue',
  'upcoming',
  'unscheduled',
  'outOfWindow',
  'ended',
];

export function CordLegend({ entries = ALL }: { entries?: readonly Entry[] }) {
  return (
    <ul aria-label={words.legend} className="flex flex-wrap gap-x-6 gap-y-1 text-13 text-faded">
      {entries.map((entry) => (
        <li key={entry} className="flex items-center gap-2">
          <Sample entry={entry} />
          {words.legendOf[entry]}
        </li>
      ))}
    </ul>
  );
}

function Sample({ entry }: { entry: Entry }) {
  const mask = useId();
  const state: CordState = entry === 'outOfWindow' || entry === 'ended' ? 'done' : entry;
  const bracket =
    entry === 'open' || entry === 'closing' || entry === 'overdue'
      ? [8, 32]
      : entry === 'outOfWindow'
        ? [4, 20]
        : null;
  const at = entry === 'outOfWindow' ? 30 : 20;
  const end = entry === 'ended' ? 20 : 40;
  const dotted = entry === 'upcoming';
  return (
    <svg width={40} height={CORD.height} className="overflow-visible" aria-hidden="true">
      <mask id={mask} maskUnits="userSpaceOnUse" x={0} y={0} width={40} height={CORD.height}>
        <rect width={40} height={CORD.height} fill="white" />
        {entry !== 'ended' && (
          <g transform={`translate(${at} ${CORD.line})`}>
            <KnotCut state={state} />
          </g>
        )}
      </mask>
      <g mask={`url(#${mask})`}>
        <line
          x2={end}
          y1={CORD.line}
          y2={CORD.line}
          stroke={dotted ? 'var(--color-edge)' : 'var(--color-ink)'}
          strokeWidth={dotted ? 1.25 : 1.5}
          strokeDasharray={dotted ? '1 4' : undefined}
        />
      </g>
      {bracket && (
        <path
          d={`M${bracket[0]} ${CORD.bracket - 4} V${CORD.bracket} H${bracket[1]} V${CORD.bracket - 4}`}
          fill="none"
          stroke="var(--color-edge)"
          strokeWidth={1.25}
        />
      )}
      <g transform={`translate(${at} ${CORD.line})`}>
        {entry === 'ended' ? (
          <EndCap />
        ) : (
          <Knot state={state} outOfWindow={entry === 'outOfWindow'} />
        )}
      </g>
    </svg>
  );
}
