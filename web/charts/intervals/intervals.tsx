/** One quantity by several methods: estimate and 95 % interval, with the figures beside the marks. */
import { scaleLinear } from 'd3';
import { chartsWords } from '../../words/charts.ts';
import { formatEstimate, formatInterval } from '../../words/numbers.ts';
import { AxisName, FigureRow, r } from '../marks/axes.tsx';
import { STAMP_HEIGHT, StampMark } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { domainOf, ticksFor } from '../marks/ticks.ts';
import { Figure } from '../picture/figure.tsx';
import type { Picture, Size, TwinTable } from '../picture/types.ts';

const words = chartsWords.interval;
/** Three lines a method: its name over the whole width, then bar and estimate, then the interval. */
const ROW = 58;

export type IntervalRow = {
  method: string;
  estimate: number | null;
  /** Null limits beside an estimate are open: the interval has no end on that side. */
  lower: number | null;
  upper: number | null;
  error: number | null;
  /** The interval that the headline speaks of. */
  chief: boolean;
  /** Said under the figures: degrees of freedom, p, or why there is no interval. */
  note: string;
};

type Props = {
  picture: Omit<Picture, 'table'>;
  rows: readonly IntervalRow[];
  /** "cm a week" */
  unit: string;
  level?: 2 | 3;
};

function tableOf({ rows, unit }: Props): TwinTable {
  return {
    columns: [
      { name: words.method, numeric: false },
      { name: words.estimate, unit, numeric: true },
      { name: words.lower, unit, numeric: true },
      { name: words.upper, unit, numeric: true },
      { name: words.note, numeric: false },
    ],
    rows: rows.map((row) => [row.method, row.estimate, row.lower, row.upper, row.note]),
  };
}

export function Intervals(props: Props) {
  const head = props.picture.stamp ? STAMP_HEIGHT : 0;
  return (
    <Figure
      level={props.level}
      picture={{ ...props.picture, table: tableOf(props) }}
      heightFor={() => head + props.rows.length * ROW + 48}
      marks={(size) => <IntervalMarks {...props} size={size} />}
    />
  );
}

export function IntervalMarks(props: Omit<Props, 'level'> & { size: Size }) {
  const { rows, size, picture } = props;
  const figures = rows.map((row) => ({
    estimate: formatEstimate(row.estimate, row.error),
    interval: intervalText(row),
  }));
  const top = picture.stamp ? STAMP_HEIGHT : 0;
  const bottom = top + rows.length * ROW;
  const widest = Math.max(
    ...figures.flatMap((each) => [
      textWidth(each.estimate, 13, 'mono'),
      textWidth(each.interval, 13, 'mono'),
    ]),
  );
  const right = size.width - Math.ceil(widest) - 20;
  const domain = domainOf(
    rows.flatMap((row) => [row.estimate, row.lower, row.upper].filter((each) => each !== null)),
    true,
  );
  const air = (domain[1] - domain[0]) * 0.04;
  const x = scaleLinear([domain[0] - air, domain[1] + air], [0, right]);
  const ticks = ticksFor(x.domain() as [number, number], Math.max(2, Math.round(right / 90)));
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      <StampMark text={picture.stamp} right={size.width} />
      {ticks.map((tick) => (
        <line
          key={tick.at}
          x1={r(x(tick.at))}
          x2={r(x(tick.at))}
          y1={top}
          y2={bottom}
          stroke={tick.at === 0 ? 'var(--color-ink)' : 'var(--color-line)'}
        />
      ))}
      {rows.map((row, index) => (
        <g key={row.method} transform={`translate(0 ${top + index * ROW})`}>
          <text
            y={14}
            fontSize={13}
            fontFamily="var(--font-sans)"
            fill="var(--color-ink)"
            stroke="var(--color-surface)"
            strokeWidth={4}
            paintOrder="stroke"
          >
            {row.method}
          </text>
          <Mark row={row} x={x} right={right} />
          <text
            x={size.width}
            y={33}
            textAnchor="end"
            fontSize={13}
            fontFamily="var(--font-mono)"
            fontWeight={row.chief ? 600 : 400}
            fill="var(--color-ink)"
          >
            {figures[index]?.estimate}
          </text>
          <text
            x={size.width}
            y={50}
            textAnchor="end"
            fontSize={13}
            fontFamily="var(--font-mono)"
            fill="var(--color-faded)"
          >
            {figures[index]?.interval}
          </text>
        </g>
      ))}
      <FigureRow ticks={ticks} x={x} y={bottom + 18} />
      <AxisName x={right / 2} y={bottom + 38}>
        {props.unit}
      </AxisName>
    </svg>
  );
}

/** An interval without an end on one side says so; without both there is none, and the note stands alone. */
function intervalText(row: IntervalRow): string {
  if (row.lower === null && row.upper === null) return row.note;
  if (row.lower === null) return words.upTo(formatEstimate(row.upper, row.error));
  if (row.upper === null) return words.from(formatEstimate(row.lower, row.error));
  return formatInterval(row.lower, row.upper, row.error);
}

function Mark(props: { row: IntervalRow; x: (value: number) => number; right: number }) {
  const { row, x, right } = props;
  if (row.estimate === null) return null;
  const colour = row.chief ? 'var(--color-kelp)' : 'var(--color-faded)';
  const y = 36;
  const bounded = row.lower !== null || row.upper !== null;
  const from = row.lower === null ? 4 : r(x(row.lower));
  const to = row.upper === null ? right - 4 : r(x(row.upper));
  return (
    <g stroke={colour} strokeWidth={2} fill="none">
      {bounded && <line x1={from} x2={to} y1={y} y2={y} />}
      {bounded && row.lower === null && <path d={`M9 ${y - 5}L4 ${y}L9 ${y + 5}`} />}
      {bounded && row.upper === null && (
        <path d={`M${right - 9} ${y - 5}L${right - 4} ${y}L${right - 9} ${y + 5}`} />
      )}
      <circle cx={r(x(row.estimate))} cy={y} r={4.5} fill={colour} stroke="none" />
    </g>
  );
}
