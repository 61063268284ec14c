/** Thin paths of all subjects, the picked one in full ink, and where follow-up ended early. */
import { line } from 'd3';
import { r } from '../marks/axes.tsx';
import { textWidth } from '../marks/text.ts';
import { type Layout, pathOf } from './layout.ts';
import type { DrawAs, SpaghettiSubject } from './types.ts';

const OPACITY = 'var(--subject-opacity, 0.18)';

/** A line over less than a third of the time axis says less: it is drawn fainter. */
const SHORT_SPAN = 1 / 3;

export function linePath(
  points: readonly { time: number; value: number }[],
  layout: Layout,
): string {
  const path = line<{ time: number; value: number }>(
    (point) => r(layout.x(point.time)),
    (point) => r(layout.y(point.value)),
  )(points);
  // A subject with one reading is a dot, not nothing.
  return points.length === 1 ? `${path ?? ''}h0` : (path ?? '');
}

export function isShort(subject: SpaghettiSubject, layout: Layout): boolean {
  const first = subject.readings[0];
  const last = subject.readings.at(-1);
  if (!first || !last) return true;
  return layout.x(last.time) - layout.x(first.time) < (layout.right - layout.left) * SHORT_SPAN;
}

export function Paths(props: {
  subjects: readonly SpaghettiSubject[];
  as: DrawAs;
  layout: Layout;
}) {
  return (
    <g fill="none" stroke="var(--color-ink)" strokeLinecap="round">
      {props.subjects.map((subject) => (
        <path
          key={subject.id}
          d={linePath(pathOf(subject, props.as), props.layout)}
          strokeOpacity={OPACITY}
          strokeWidth={subject.readings.length === 1 ? 4 : 1}
          strokeDasharray={props.as === 'own lines' && subject.own?.n === 2 ? '5 4' : undefined}
          opacity={props.as === 'own lines' && isShort(subject, props.layout) ? 0.55 : undefined}
        />
      ))}
    </g>
  );
}

/** The blunt cap of the cord, at the last reading of those whose follow-up ended early. */
export function Ends(props: { subjects: readonly SpaghettiSubject[]; as: DrawAs; layout: Layout }) {
  const caps = props.subjects
    .filter((subject) => subject.ended)
    .map((subject) => {
      const last = pathOf(subject, props.as).at(-1);
      return last ? `M${r(props.layout.x(last.time))} ${r(props.layout.y(last.value) - 4)}v8` : '';
    })
    .join('');
  return (
    <path d={caps} stroke="var(--color-ink)" strokeWidth={1.75} strokeOpacity={0.6} fill="none" />
  );
}

export function Highlight(props: {
  subject: SpaghettiSubject;
  as: DrawAs;
  layout: Layout;
  hovered: boolean;
  /** Where the names of pooled lines stand; a code must not hide them. */
  names: readonly { x: number; y: number; text: string }[];
}) {
  const { subject, layout } = props;
  const path = pathOf(subject, props.as);
  const last = path.at(-1);
  if (!last) return null;
  const end = layout.x(last.time);
  // The code stands where it can be read whole: left of the end where the picture stops.
  const inside = end > layout.right - 70;
  const over = layout.y(last.value) + (inside ? -10 : 4);
  const hides = (y: number) =>
    props.names.some(
      (name) => Math.abs(name.y - y) < 15 && end + 70 > name.x - textWidth(name.text, 13),
    );
  const labelAt = hides(over) ? layout.y(last.value) + 22 : over;
  return (
    <g>
      <path
        d={linePath(path, layout)}
        fill="none"
        stroke="var(--color-ink)"
        strokeWidth={props.hovered ? 1.5 : 2.5}
        strokeLinejoin="round"
        strokeDasharray={props.as === 'own lines' && subject.own?.n === 2 ? '5 4' : undefined}
      />
      {subject.readings.map((reading) => (
        <circle
          key={`${reading.visit} ${reading.time} ${reading.value}`}
          cx={r(layout.x(reading.time))}
          cy={r(layout.y(reading.value))}
          r={3.5}
          fill="var(--color-ink)"
        />
      ))}
      <text
        x={r(inside ? end - 4 : end + 8)}
        y={r(labelAt)}
        textAnchor={inside ? 'end' : 'start'}
        fontSize={13}
        fontWeight={600}
        fontFamily="var(--font-mono)"
        fill="var(--color-ink)"
        stroke="var(--color-surface)"
        strokeWidth={4}
        paintOrder="stroke"
      >
        {subject.code}
      </text>
    </g>
  );
}
