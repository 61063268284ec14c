/** Residuals by subject: as observed, and the same residuals dealt to subjects at random. */
import { bisector, scaleLinear } from 'd3';
import { useMemo } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { AxisName, LeftAxis, r } from '../marks/axes.tsx';
import { STAMP_HEIGHT, StampMark } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { domainOf, ticksFor } from '../marks/ticks.ts';
import { Figure } from '../picture/figure.tsx';
import { PickArea } from '../picture/picking.tsx';
import type { Picture, Size, TwinTable } from '../picture/types.ts';

const words = chartsWords.residuals;

export type SubjectResiduals = {
  id: string;
  code: string;
  mean: number;
  /** In the order of their times. */
  residuals: readonly number[];
};

type Props = {
  picture: Omit<Picture, 'table'>;
  subjects: readonly SubjectResiduals[];
  /** The same for the picture and its twin, so that they can be compared. */
  domain: readonly [number, number];
  unit: string | null;
  /** Spans in the colour of dependence: only for readings as observed, and only where they hang together. */
  tethered: boolean;
  picked: string | null;
  onPick: (id: string | null) => void;
  level?: 2 | 3;
};

/** One scale for the residuals as observed and as dealt: they are the same numbers. */
export function residualDomain(subjects: readonly SubjectResiduals[]): [number, number] {
  return domainOf(subjects.flatMap((subject) => subject.residuals));
}

function tableOf(subjects: readonly SubjectResiduals[], unit: string | null): TwinTable {
  const of = unit ?? undefined;
  return {
    columns: [
      { name: words.columns.subject, numeric: false },
      { name: words.columns.mean, unit: of, numeric: true },
      { name: words.columns.place, numeric: true, decimals: 0 },
      { name: words.columns.residual, unit: of, numeric: true },
    ],
    rows: subjects.flatMap((subject) =>
      subject.residuals.map((residual, index) => [subject.code, subject.mean, index + 1, residual]),
    ),
  };
}

export function Residuals(props: Props) {
  const { subjects, unit } = props;
  const ordered = useMemo(() => [...subjects].sort((a, b) => a.mean - b.mean), [subjects]);
  const table = useMemo(() => tableOf(ordered, unit), [ordered, unit]);
  const marks = (size: Size) => <ResidualMarks {...props} subjects={ordered} size={size} />;
  return (
    <Figure
      level={props.level}
      picture={{ ...props.picture, table }}
      heightFor={(width) => Math.round(Math.min(330, Math.max(220, width * 0.5)))}
      marks={marks}
      page={(size) => {
        const { x } = layoutOf(ordered.length, props.domain, size, props.picture.stamp !== null);
        return (
          <PickArea
            label={chartsWords.spaghetti.pick}
            none={chartsWords.spaghetti.nonePicked}
            order={ordered}
            picked={props.picked}
            onPick={props.onPick}
            nearest={(at) => nearestColumn(ordered, x, at)}
          >
            {marks(size)}
          </PickArea>
        );
      }}
    />
  );
}

function nearestColumn(
  ordered: readonly SubjectResiduals[],
  x: (index: number) => number,
  at: number,
): string | null {
  const columns = ordered.map((_, index) => x(index));
  const index = bisector((place: number) => place).center(columns, at);
  return ordered[index]?.id ?? null;
}

function layoutOf(count: number, domain: readonly [number, number], size: Size, stamped: boolean) {
  const head = stamped ? STAMP_HEIGHT : 0;
  const top = head + 26;
  const bottom = size.height - 30;
  const ticks = ticksFor(domain, 5);
  const left = Math.ceil(Math.max(...ticks.map((tick) => textWidth(tick.text, 13, 'mono')))) + 14;
  const right = size.width - 6;
  const air = Math.min(24, (right - left) / (2 * Math.max(1, count)));
  return {
    ticks,
    left,
    right,
    bottom,
    nameAt: head + 13,
    x: scaleLinear([0, Math.max(1, count - 1)], [left + air, right - air]),
    y: scaleLinear([...domain], [bottom, top]),
  };
}

export function ResidualMarks(props: Omit<Props, 'level'> & { size: Size }) {
  const { subjects, size, picture, domain } = props;
  const { stamp } = picture;
  const drawn = useMemo(() => {
    const layout = layoutOf(subjects.length, domain, size, stamp !== null);
    let spans = '';
    let points = '';
    subjects.forEach((subject, index) => {
      const x = r(layout.x(index));
      const ys = subject.residuals.map((residual) => r(layout.y(residual)));
      if (ys.length > 1) spans += `M${x} ${Math.max(...ys)}V${Math.min(...ys)}`;
      // All points in one path: thousands of elements would make the page slow.
      for (const y of ys) points += `M${x} ${y}h0`;
    });
    return { layout, spans, points };
  }, [subjects, domain, size, stamp]);
  const { layout } = drawn;
  const step = (layout.right - layout.left) / Math.max(1, subjects.length);
  const at = subjects.findIndex((subject) => subject.id === props.picked);
  const picked = subjects[at];
  const x = r(layout.x(at));
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      <StampMark text={stamp} right={size.width} />
      <LeftAxis
        ticks={layout.ticks}
        y={layout.y}
        from={layout.left}
        to={layout.right}
        name={words.y(props.unit)}
        nameAt={layout.nameAt}
      />
      <path
        d={drawn.spans}
        fill="none"
        stroke={props.tethered ? 'var(--color-flare)' : 'var(--color-edge)'}
        strokeWidth={r(Math.max(1, Math.min(3, step * 0.5)))}
        strokeOpacity={props.tethered ? 0.8 : 0.7}
      />
      <path
        d={drawn.points}
        fill="none"
        stroke="var(--color-ink)"
        strokeLinecap="round"
        strokeWidth={r(Math.max(1, Math.min(5, step * 0.55)))}
      />
      {picked && (
        <g>
          <path
            d={`M${x} ${r(layout.y(Math.max(...picked.residuals)))}V${r(layout.y(Math.min(...picked.residuals)))}`}
            stroke="var(--color-ink)"
            strokeWidth={2.5}
          />
          <path
            d={picked.residuals.map((residual) => `M${x} ${r(layout.y(residual))}h0`).join('')}
            stroke="var(--color-ink)"
            strokeLinecap="round"
            strokeWidth={7}
          />
          <text
            x={x + (at > subjects.length / 2 ? -8 : 8)}
            y={r(layout.y(Math.max(...picked.residuals)) + (picked.mean > 0 ? 4 : -6))}
            textAnchor={at > subjects.length / 2 ? 'end' : 'start'}
            fontSize={13}
            fontWeight={600}
            fontFamily="var(--font-mono)"
            fill="var(--color-ink)"
            stroke="var(--color-surface)"
            strokeWidth={4}
            paintOrder="stroke"
          >
            {picked.code}
          </text>
        </g>
      )}
      <AxisName x={(layout.left + layout.right) / 2} y={size.height - 8}>
        {words.x}
      </AxisName>
    </svg>
  );
}
