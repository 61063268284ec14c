/** The cord: a subject's follow-up as a line with knots at true time spacing. */
import { useId } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { CORD, cordRuns, drawnVisits, hasBracket, knotDay, placeOf } from './geometry.ts';
import { EndCap, Knot, KnotCut } from './knot.tsx';
import type { CordScale, CordState, CordVisit } from './types.ts';

const words = chartsWords.cord;
const ORDER: readonly CordState[] = [
  'done',
  'partly done',
  'missed',
  'overdue',
  'closing',
  'open',
  'upcoming',
  'unscheduled',
];

/** What the cord says, for those who do not see it. */
export function cordText(
  visits: readonly CordVisit[],
  endWord: string | null,
  endedAt: number | null = null,
): string {
  const shown = drawnVisits(visits, endedAt);
  const counts = ORDER.map((state) => {
    const of = shown.filter((visit) => visit.state === state);
    return { state, count: of.length, names: of.map((visit) => visit.name) };
  }).filter(({ count }) => count > 0);
  return words.summary(counts, shown.filter((visit) => visit.outOfWindow).length, endWord);
}

type Props = {
  visits: readonly CordVisit[];
  /** Today in days since baseline; null where there is no baseline yet, or where "today" means nothing. */
  today: number | null;
  endedAt?: number | null;
  endWord?: string | null;
  scale: CordScale;
};

export function Cord({ visits, today, endedAt = null, endWord = null, scale }: Props) {
  const mask = useId();
  const shown = drawnVisits(visits, endedAt);
  const runs = cordRuns(visits, today, endedAt, scale);
  const brackets = shown.filter(hasBracket);
  return (
    <div className="px-2">
      <svg
        role="img"
        aria-label={cordText(visits, endWord, endedAt)}
        className="block overflow-visible"
        width="100%"
        height={CORD.height}
      >
        <mask id={mask} maskUnits="userSpaceOnUse" x="-5%" y={0} width="110%" height={CORD.height}>
          <rect x="-5%" width="110%" height={CORD.height} fill="white" />
          {shown.map((visit) => (
            <At key={visit.id} place={placeOf(knotDay(visit) ?? 0, scale)}>
              <KnotCut state={visit.state} />
            </At>
          ))}
        </mask>
        {/* A straight line has no height, so a mask in its own units would be empty: this group spans the row. */}
        <g mask={`url(#${mask})`}>
          {runs.solid && <Run run={runs.solid} dotted={false} />}
          {runs.dotted && <Run run={runs.dotted} dotted={true} />}
        </g>
        {brackets.map((visit) => (
          <Bracket key={visit.id} visit={visit} scale={scale} />
        ))}
        {shown.map((visit) => (
          <At key={visit.id} place={placeOf(knotDay(visit) ?? 0, scale)}>
            <g>
              <title>{words.knot({ ...visit, at: knotDay(visit) })}</title>
              <circle r={9} fill="transparent" />
              <Knot state={visit.state} outOfWindow={visit.outOfWindow} />
            </g>
          </At>
        ))}
        {endedAt !== null && runs.solid && (
          <End
            place={runs.solid.to}
            word={endWord}
            onKnot={shown.some(
              (visit) =>
                Math.abs(placeOf(knotDay(visit) ?? 0, scale) - (runs.solid?.to ?? 0)) < 1.5,
            )}
            crowded={brackets.some(
              (visit) => placeOf(visit.windowTo ?? 0, scale) > (runs.solid?.to ?? 0) - 20,
            )}
          />
        )}
      </svg>
    </div>
  );
}

/** A place on the cord: everything inside is drawn around (0, 0) on the line. */
function At({ place, children }: { place: number; children: React.ReactNode }) {
  return (
    <svg aria-hidden="true" x={`${round(place)}%`} y={CORD.line} overflow="visible">
      {children}
    </svg>
  );
}

function Run({ run, dotted }: { run: { from: number; to: number }; dotted: boolean }) {
  return (
    <line
      x1={`${round(run.from)}%`}
      x2={`${round(run.to)}%`}
      y1={CORD.line}
      y2={CORD.line}
      stroke={dotted ? 'var(--color-edge)' : 'var(--color-ink)'}
      strokeWidth={dotted ? 1.25 : 1.5}
      strokeDasharray={dotted ? '1 4' : undefined}
    />
  );
}

function Bracket({ visit, scale }: { visit: CordVisit; scale: CordScale }) {
  const from = `${round(placeOf(visit.windowFrom ?? 0, scale))}%`;
  const to = `${round(placeOf(visit.windowTo ?? 0, scale))}%`;
  const stroke = { stroke: 'var(--color-edge)', strokeWidth: 1.25 };
  return (
    <g>
      <line x1={from} x2={to} y1={CORD.bracket} y2={CORD.bracket} {...stroke} />
      <line x1={from} x2={from} y1={CORD.bracket - 4} y2={CORD.bracket + 0.6} {...stroke} />
      <line x1={to} x2={to} y1={CORD.bracket - 4} y2={CORD.bracket + 0.6} {...stroke} />
    </g>
  );
}

/**
 * The cap stands a little past a knot that it would hide. Its word stands after it where there is room,
 * else under the cord, or over it beside a bracket.
 */
function End(props: { place: number; word: string | null; onKnot: boolean; crowded: boolean }) {
  const room = props.place < 72;
  const on = props.onKnot ? 10 : 0;
  return (
    <At place={props.place}>
      {on > 0 && <line x2={on} stroke="var(--color-ink)" strokeWidth={1.5} />}
      <g transform={`translate(${on} 0)`}>
        <EndCap />
        {props.word && (
          <text
            x={room ? 8 : 1}
            y={room ? 4.5 : props.crowded ? -9 : CORD.word - CORD.line}
            textAnchor={room ? 'start' : 'end'}
            fontSize={13}
            fill="var(--color-ink)"
          >
            {props.word}
          </text>
        )}
      </g>
    </At>
  );
}

function round(value: number): number {
  return Math.round(value * 1000) / 1000;
}
