/** Ribbons of quantiles by visit, and the paths of the subjects furthest from them, by name. */
import { area, line } from 'd3';
import { r } from '../marks/axes.tsx';
import type { Layout } from './layout.ts';
import { linePath } from './paths.tsx';
import type { RibbonPoint } from './ribbons.ts';
import type { SpaghettiSubject } from './types.ts';

export function Ribbons({ points, layout }: { points: readonly RibbonPoint[]; layout: Layout }) {
  const x = (point: RibbonPoint) => r(layout.x(point.time));
  const between = (low: (point: RibbonPoint) => number, high: (point: RibbonPoint) => number) =>
    area<RibbonPoint>(
      x,
      (point) => r(layout.y(low(point))),
      (point) => r(layout.y(high(point))),
    )([...points]) ?? '';
  const middle = line<RibbonPoint>(x, (point) => r(layout.y(point.middle)))([...points]) ?? '';
  return (
    <g fill="var(--color-ink)">
      <path
        d={between(
          (point) => point.low,
          (point) => point.high,
        )}
        fillOpacity={0.09}
      />
      <path
        d={between(
          (point) => point.lower,
          (point) => point.upper,
        )}
        fillOpacity={0.14}
      />
      <path d={middle} fill="none" stroke="var(--color-ink)" strokeOpacity={0.6} strokeWidth={1} />
    </g>
  );
}

export function Outlying(props: { subjects: readonly SpaghettiSubject[]; layout: Layout }) {
  const { subjects, layout } = props;
  const labels = subjects.flatMap((subject) => {
    const last = subject.readings.at(-1);
    return last ? [{ code: subject.code, x: layout.x(last.time), y: layout.y(last.value) }] : [];
  });
  labels.sort((a, b) => a.y - b.y);
  labels.forEach((label, index) => {
    const above = labels[index - 1];
    if (above && label.y - above.y < 15) label.y = above.y + 15;
  });
  return (
    <g>
      {subjects.map((subject) => (
        <path
          key={subject.id}
          d={linePath(subject.readings, layout)}
          fill="none"
          stroke="var(--color-ink)"
          strokeOpacity={0.7}
        />
      ))}
      {labels.map((label) => (
        <text
          key={label.code}
          x={r(Math.min(label.x, layout.right) - 4)}
          y={r(label.y - 5)}
          textAnchor="end"
          fontSize={13}
          fontFamily="var(--font-mono)"
          fill="var(--color-ink)"
          stroke="var(--color-surface)"
          strokeWidth={3}
          paintOrder="stroke"
        >
          {label.code}
        </text>
      ))}
    </g>
  );
}
