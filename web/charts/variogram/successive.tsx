/** Each residual against the next one of the same subject, both less the subject's own mean. */
import { scaleLinear } from 'd3';
import { useMemo } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { AxisName, FigureRow, LeftAxis, r } from '../marks/axes.tsx';
import { STAMP_HEIGHT, StampMark } from '../marks/stamp-mark.tsx';
import { textWidth } from '../marks/text.ts';
import { domainOf, ticksFor } from '../marks/ticks.ts';
import { Figure } from '../picture/figure.tsx';
import type { Picture, Size, TwinTable } from '../picture/types.ts';
import type { SubjectResiduals } from '../residuals/residuals.tsx';

const words = chartsWords.successive;

export type SuccessivePair = { id: string; code: string; place: number; now: number; next: number };

/** Neighbours in time within a subject, less the subject's mean: the pairs that lag-1 is made of. */
export function successivePairs(subjects: readonly SubjectResiduals[]): SuccessivePair[] {
  return subjects.flatMap(({ id, code, residuals }) => {
    const mean = residuals.reduce((sum, each) => sum + each, 0) / Math.max(1, residuals.length);
    return residuals.slice(1).map((next, index) => ({
      id,
      code,
      place: index + 1,
      now: (residuals[index] ?? 0) - mean,
      next: next - mean,
    }));
  });
}

type Props = {
  picture: Omit<Picture, 'table'>;
  pairs: readonly SuccessivePair[];
  unit: string | null;
  picked: string | null;
  level?: 2 | 3;
};

export function Successive(props: Props) {
  const { pairs } = props;
  const unit = props.unit ?? undefined;
  const table: TwinTable = useMemo(
    () => ({
      columns: [
        { name: words.columns.subject, numeric: false },
        { name: words.columns.place, numeric: true, decimals: 0 },
        { name: words.columns.now, unit, numeric: true },
        { name: words.columns.next, unit, numeric: true },
      ],
      rows: pairs.map((pair) => [pair.code, pair.place, pair.now, pair.next]),
    }),
    [pairs, unit],
  );
  return (
    <Figure
      level={props.level}
      picture={{ ...props.picture, table }}
      heightFor={(width) => Math.round(Math.min(340, Math.max(240, width * 0.5)))}
      marks={(size) => <SuccessiveMarks {...props} size={size} />}
    />
  );
}

export function SuccessiveMarks(props: Omit<Props, 'level'> & { size: Size }) {
  const { pairs, size, picture } = props;
  const head = picture.stamp ? STAMP_HEIGHT : 0;
  const bottom = size.height - 48;
  const domain = useMemo(() => domainOf(pairs.flatMap((pair) => [pair.now, pair.next])), [pairs]);
  const ticks = ticksFor(domain, 5);
  const left = Math.ceil(Math.max(...ticks.map((tick) => textWidth(tick.text, 13, 'mono')))) + 14;
  const right = size.width - 14;
  const x = scaleLinear(domain, [left, right]);
  const y = scaleLinear(domain, [bottom, head + 26]);
  const dots = (of: readonly SuccessivePair[]) =>
    of.map((pair) => `M${r(x(pair.now))} ${r(y(pair.next))}h0`).join('');
  const picked = pairs.filter((pair) => pair.id === props.picked);
  const dot = { fill: 'none', stroke: 'var(--color-ink)', strokeLinecap: 'round' } as const;
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      <StampMark text={picture.stamp} right={size.width} />
      <LeftAxis
        ticks={ticks}
        y={y}
        from={left}
        to={right}
        name={words.y(props.unit)}
        nameAt={head + 13}
      />
      <line x1={r(x(0))} x2={r(x(0))} y1={head + 26} y2={bottom} stroke="var(--color-line)" />
      <path
        d={dots(pairs)}
        {...dot}
        strokeWidth={3.5}
        strokeOpacity={pairs.length > 400 ? 0.3 : 0.55}
      />
      {picked.length > 0 && <path d={dots(picked)} {...dot} strokeWidth={8} />}
      <FigureRow ticks={ticks} x={x} y={bottom + 19} />
      <AxisName x={(left + right) / 2} y={size.height - 8}>
        {words.x(props.unit)}
      </AxisName>
    </svg>
  );
}
