/** The ratios of all coefficients in one picture: what leaves the page as a file. */
import type { ReactElement, ReactNode } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { formatRatio } from '../../words/numbers.ts';
import { AxisName, FigureRow, r } from '../marks/axes.tsx';
import { STAMP_HEIGHT, StampMark } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { Figure } from '../picture/figure.tsx';
import type { Picture, Size, TwinTable } from '../picture/types.ts';
import { ratioScale } from './ratio-scale.ts';

const words = chartsWords.ratio;
const ROW = 34;

export type RatioRow = { name: string; ratio: number | null; moulton: number | null };

type Props = {
  picture: Omit<Picture, 'table'>;
  rows: readonly RatioRow[];
  /** The page's own table with the bars in it; files hold the bars alone. */
  page?: () => ReactElement;
  children?: ReactNode;
  level?: 2 | 3;
};

/** Ratios only: the ordinary errors themselves leave the page in no file while the fit is locked. */
function tableOf(rows: readonly RatioRow[]): TwinTable {
  return {
    columns: [
      { name: words.columns.coefficient, numeric: false },
      { name: words.columns.ratio, numeric: true, decimals: 2 },
      { name: words.columns.moulton, numeric: true, decimals: 2 },
    ],
    rows: rows.map((row) => [row.name, row.ratio, row.moulton]),
  };
}

export function RatioBars(props: Props) {
  const head = props.picture.stamp ? STAMP_HEIGHT : 0;
  return (
    <Figure
      level={props.level}
      picture={{ ...props.picture, table: tableOf(props.rows) }}
      heightFor={() => head + props.rows.length * ROW + 78}
      marks={(size) => <RatioMarks picture={props.picture} rows={props.rows} size={size} />}
      page={props.page}
    >
      {props.children}
    </Figure>
  );
}

export function RatioMarks(props: {
  picture: Omit<Picture, 'table'>;
  rows: readonly RatioRow[];
  size: Size;
}) {
  const { rows, size, picture } = props;
  const scale = ratioScale(rows.flatMap((row) => [row.ratio, row.moulton]));
  const left = Math.ceil(Math.max(...rows.map((row) => textWidth(row.name, 15)))) + 24;
  const right = size.width - 70;
  const top = (picture.stamp ? STAMP_HEIGHT : 0) + 6;
  const bottom = top + rows.length * ROW;
  const x = (ratio: number) => left + ((right - left) * scale.place(ratio)) / 100;
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      <StampMark text={picture.stamp} right={size.width} />
      {scale.ticks.map((tick) => (
        <line
          key={tick.at}
          x1={r(x(tick.at))}
          x2={r(x(tick.at))}
          y1={top}
          y2={bottom}
          stroke={tick.at === 1 ? 'var(--color-ink)' : 'var(--color-line)'}
        />
      ))}
      {rows.map((row, index) => {
        const middle = top + (index + 0.5) * ROW;
        const ratio = row.ratio ?? 1;
        return (
          <g key={row.name}>
            <text
              y={middle}
              dy="0.33em"
              fontSize={15}
              fontFamily="var(--font-sans)"
              fill="var(--color-ink)"
            >
              {row.name}
            </text>
            <rect
              x={r(Math.min(x(1), x(ratio)))}
              width={r(Math.abs(x(ratio) - x(1)))}
              y={middle - 5}
              height={10}
              fill="var(--color-flare)"
            />
            {row.moulton !== null && row.moulton > 0 && (
              <line
                x1={r(x(row.moulton))}
                x2={r(x(row.moulton))}
                y1={middle - 9}
                y2={middle + 9}
                stroke="var(--color-ink)"
                strokeWidth={2}
              />
            )}
            <text
              x={size.width}
              y={middle}
              dy="0.33em"
              textAnchor="end"
              fontSize={15}
              fontFamily="var(--font-mono)"
              fill="var(--color-ink)"
            >
              {formatRatio(row.ratio)}
            </text>
          </g>
        );
      })}
      <FigureRow ticks={scale.ticks} x={x} y={bottom + 18} />
      <AxisName x={(left + right) / 2} y={bottom + 38}>
        {words.x}
      </AxisName>
      <g transform={`translate(${left} ${bottom + 50})`}>
        <line x1={1} x2={1} y2={16} stroke="var(--color-ink)" strokeWidth={2} />
        <text x={10} y={13} fontSize={13} fontFamily="var(--font-sans)" fill="var(--color-faded)">
          {words.moulton}
        </text>
      </g>
    </svg>
  );
}
