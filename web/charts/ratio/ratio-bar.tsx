/** One ratio as a bar from 1, for a cell of a table; shares of the width, so that a column needs no measuring. */
import { r } from '../marks/axes.tsx';
import type { RatioScale } from './ratio-scale.ts';

const HEIGHT = 24;

export function RatioBar(props: {
  ratio: number | null;
  moulton: number | null;
  scale: RatioScale;
  height?: number;
}) {
  const { scale, ratio, moulton, height = HEIGHT } = props;
  const one = scale.place(1);
  const to = ratio === null ? one : scale.place(ratio);
  const middle = height / 2;
  return (
    <svg width="100%" height={height} aria-hidden="true" className="block overflow-visible">
      {scale.ticks.map((tick) => (
        <line
          key={tick.at}
          x1={`${r(scale.place(tick.at))}%`}
          x2={`${r(scale.place(tick.at))}%`}
          y2={height}
          stroke={tick.at === 1 ? 'var(--color-ink)' : 'var(--color-line)'}
        />
      ))}
      {ratio !== null && (
        <rect
          x={`${r(Math.min(one, to))}%`}
          width={`${r(Math.abs(to - one))}%`}
          y={middle - 5}
          height={10}
          fill="var(--color-flare)"
        />
      )}
      {moulton !== null && moulton > 0 && (
        <line
          x1={`${r(scale.place(moulton))}%`}
          x2={`${r(scale.place(moulton))}%`}
          y1={middle - 9}
          y2={middle + 9}
          stroke="var(--color-ink)"
          strokeWidth={2}
        />
      )}
    </svg>
  );
}

export function RatioTicks({ scale }: { scale: RatioScale }) {
  return (
    <svg width="100%" height={18} aria-hidden="true" className="block overflow-visible">
      {scale.ticks.map((tick) => (
        <text
          key={tick.at}
          x={`${r(scale.place(tick.at))}%`}
          y={13}
          textAnchor="middle"
          fontSize={13}
          fontFamily="var(--font-mono)"
          fontWeight={400}
          fill="var(--color-faded)"
        >
          {tick.text}
        </text>
      ))}
    </svg>
  );
}
