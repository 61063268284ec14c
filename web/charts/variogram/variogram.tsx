/** How far apart two readings of one subject lie, by the time between them, against readings of different subjects. */
import { line, max, scaleLinear } from 'd3';
import { chartsWords } from '../../words/charts.ts';
import { formatCount, formatNumber } from '../../words/numbers.ts';
import { AxisName, FigureRow, LeftAxis, r } from '../marks/axes.tsx';
import { STAMP_HEIGHT, StampMark } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { ticksFor } from '../marks/ticks.ts';
import { Figure } from '../picture/figure.tsx';
import type { Picture, Size, TwinTable } from '../picture/types.ts';

const words = chartsWords.variogram;

export type VariogramBin = { lag: number; value: number; pairs: number };

type Props = {
  picture: Omit<Picture, 'table'>;
  bins: readonly VariogramBin[];
  total: number | null;
  unit: string | null;
  /** "weeks" */
  timeUnit: string;
  tethered: boolean;
  level?: 2 | 3;
};

function tableOf({ bins, timeUnit, unit }: Props): TwinTable {
  return {
    columns: [
      { name: words.columns.lag, unit: timeUnit, numeric: true },
      { name: words.columns.value, unit: unit ? `(${unit})²` : undefined, numeric: true },
      { name: words.columns.pairs, numeric: true, decimals: 0 },
    ],
    rows: bins.map((bin) => [bin.lag, bin.value, bin.pairs]),
  };
}

export function Variogram(props: Props) {
  return (
    <Figure
      level={props.level}
      picture={{ ...props.picture, table: tableOf(props) }}
      heightFor={(width) => Math.round(Math.min(340, Math.max(240, width * 0.5)))}
      marks={(size) => <VariogramMarks {...props} size={size} />}
    />
  );
}

/** Lags whose pair counts fit beside each other. */
function readable(bins: readonly VariogramBin[], x: (lag: number) => number): VariogramBin[] {
  const kept: VariogramBin[] = [];
  for (const bin of bins) {
    const before = kept.at(-1);
    const width = textWidth(formatCount(bin.pairs), 13, 'mono') + 10;
    if (!before || x(bin.lag) - x(before.lag) >= width) kept.push(bin);
  }
  return kept;
}

export function VariogramMarks(props: Omit<Props, 'level'> & { size: Size }) {
  const { bins, total, size, picture } = props;
  const head = picture.stamp ? STAMP_HEIGHT : 0;
  const bottom = size.height - 66;
  const highest = Math.max(total ?? 0, max(bins, (bin) => bin.value) ?? 0) * 1.08 || 1;
  const yTicks = ticksFor([0, highest], 4);
  const left = Math.max(56, ...yTicks.map((tick) => textWidth(tick.text, 13, 'mono') + 14));
  const right = size.width - 14;
  // A variance is read as a share of the total one, so it stands on zero; so does the time apart.
  const x = scaleLinear([0, (max(bins, (bin) => bin.lag) ?? 1) || 1], [left, right]);
  const y = scaleLinear([0, highest], [bottom, head + 26]);
  const path = line<VariogramBin>(
    (bin) => r(x(bin.lag)),
    (bin) => r(y(bin.value)),
  )([...bins]);
  const most = max(bins, (bin) => bin.pairs) ?? 1;
  const last = bins.at(-1);
  const marked = readable(bins, x);
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      <StampMark text={picture.stamp} right={size.width} />
      <LeftAxis
        ticks={yTicks}
        y={y}
        from={left}
        to={right}
        name={words.y(props.unit)}
        nameAt={head + 13}
      />
      {total !== null && (
        <g>
          <line
            x1={left}
            x2={right}
            y1={r(y(total))}
            y2={r(y(total))}
            stroke="var(--color-ink)"
            strokeWidth={1.5}
            strokeDasharray="6 4"
          />
          <Label
            x={right}
            y={r(y(total)) - 7}
            text={`${words.total} ${formatNumber(total, decimalsOf(total))}`}
          />
        </g>
      )}
      {path && (
        <path
          d={path}
          fill="none"
          stroke={props.tethered ? 'var(--color-flare)' : 'var(--color-edge)'}
          strokeWidth={2}
        />
      )}
      {bins.map((bin) => (
        <circle
          key={bin.lag}
          cx={r(x(bin.lag))}
          cy={r(y(bin.value))}
          r={r(2 + 3.5 * Math.sqrt(bin.pairs / most))}
          fill="var(--color-ink)"
        />
      ))}
      {last && (
        <Label x={right} y={Math.min(bottom - 6, r(y(last.value)) + 22)} text={words.within} />
      )}
      <FigureRow ticks={ticksFor(x.domain() as [number, number], 6)} x={x} y={bottom + 19} />
      <FigureRow
        ticks={marked.map((bin) => ({ at: bin.lag, text: formatCount(bin.pairs) }))}
        x={x}
        y={bottom + 38}
        label={words.pairs}
        labelAt={left - 8}
      />
      <AxisName x={(left + right) / 2} y={size.height - 8}>
        {words.x(props.timeUnit)}
      </AxisName>
    </svg>
  );
}

function decimalsOf(value: number): number {
  return value >= 100 ? 0 : value >= 1 ? 1 : 3;
}

function Label({ x, y, text }: { x: number; y: number; text: string }) {
  return (
    <text
      x={x}
      y={y}
      textAnchor="end"
      fontSize={13}
      fontFamily="var(--font-sans)"
      fill="var(--color-ink)"
      stroke="var(--color-surface)"
      strokeWidth={4}
      paintOrder="stroke"
    >
      {text}
    </text>
  );
}
