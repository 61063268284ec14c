/** The pooled line with its band, named on the line, fading where few subjects remain. */
import { area, line } from 'd3';
import { r } from '../marks/axes.tsx';
import type { Layout } from './layout.ts';
import { type BandPoint, FEW_SUBJECTS, type PooledLine } from './types.ts';

/** Groups are told apart by the way their line is drawn and by their name on it, not by colour. */
const DASHES = [undefined, '9 4', '2 4', '12 4 2 4'];
const LABEL_GAP = 17;

type Run = { faint: boolean; points: BandPoint[] };

/** Runs of points at full and at faint strength; neighbours share the point where strength changes. */
function runsOf(points: readonly BandPoint[]): Run[] {
  const runs: Run[] = [];
  for (const point of points) {
    const faint = point.remaining < FEW_SUBJECTS;
    const run = runs.at(-1);
    if (run && run.faint === faint) run.points.push(point);
    else {
      const joint = run?.points.at(-1);
      runs.push({ faint, points: joint ? [joint, point] : [point] });
    }
  }
  return runs;
}

export function Pooled(props: { lines: readonly PooledLine[]; layout: Layout; lineName: string }) {
  const { lines, layout } = props;
  return (
    <g>
      {lines.map((each, index) => (
        <g key={each.group ?? ''}>
          {runsOf(each.points).map((run) => (
            <Stretch
              key={run.points[0]?.time}
              run={run}
              layout={layout}
              dash={DASHES[index % DASHES.length]}
            />
          ))}
        </g>
      ))}
      {labelsOf(lines, layout, props.lineName).map((label) => (
        <text
          key={label.text}
          x={r(label.x)}
          y={r(label.y)}
          textAnchor="end"
          fontSize={13}
          fontWeight={600}
          fontFamily="var(--font-sans)"
          fill="var(--color-kelp)"
          stroke="var(--color-surface)"
          strokeWidth={4}
          strokeLinejoin="round"
          paintOrder="stroke"
        >
          {label.text}
        </text>
      ))}
    </g>
  );
}

function Stretch({ run, layout, dash }: { run: Run; layout: Layout; dash: string | undefined }) {
  const banded = run.points.filter((point) => point.lower !== null && point.upper !== null);
  const clamp = (value: number) =>
    Math.min(layout.bottom, Math.max(layout.top - 6, layout.y(value)));
  const band = area<BandPoint>(
    (point) => r(layout.x(point.time)),
    (point) => r(clamp(point.lower ?? point.estimate)),
    (point) => r(clamp(point.upper ?? point.estimate)),
  )(banded);
  const middle = line<BandPoint>(
    (point) => r(layout.x(point.time)),
    (point) => r(layout.y(point.estimate)),
  )(run.points);
  return (
    <g opacity={run.faint ? 0.35 : undefined}>
      {band && <path d={band} fill="var(--color-kelp)" fillOpacity={0.22} />}
      {middle && (
        <path
          d={middle}
          fill="none"
          stroke="var(--color-surface)"
          strokeWidth={6}
          strokeOpacity={0.7}
        />
      )}
      {middle && (
        <path
          d={middle}
          fill="none"
          stroke="var(--color-kelp)"
          strokeWidth={3}
          strokeDasharray={dash}
        />
      )}
    </g>
  );
}

/**
 * Names at the right end of the strong part: the highest line's over it, the lowest line's under it, and
 * a single line's on the side that its slope leaves free.
 */
export function labelsOf(lines: readonly PooledLine[], layout: Layout, lineName: string) {
  const ends = lines.flatMap((each) => {
    const strong = each.points.filter((point) => point.remaining >= FEW_SUBJECTS);
    const points = strong.length > 1 ? strong : each.points;
    const last = points.at(-1);
    const first = points[0];
    return last && first ? [{ last, falls: last.estimate < first.estimate, each }] : [];
  });
  ends.sort((a, b) => b.last.estimate - a.last.estimate);
  const labels = ends.map(({ last, falls, each }, index) => {
    const under = ends.length === 1 ? falls : index > 0;
    const edge = under ? (last.lower ?? last.estimate) : (last.upper ?? last.estimate);
    const y = layout.y(edge) + (under ? 17 : -8);
    return {
      x: layout.x(last.time) - 6,
      y: Math.min(layout.bottom - 4, Math.max(layout.top + 10, y)),
      text: each.group ?? lineName,
    };
  });
  labels.forEach((label, index) => {
    const above = labels[index - 1];
    if (above && label.y - above.y < LABEL_GAP) label.y = above.y + LABEL_GAP;
  });
  return labels;
}
