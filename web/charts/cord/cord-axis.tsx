/** The time axis over a list of cords: the same shares of the width as the cords under it. */
import { chartsWords } from '../../words/charts.ts';
import { formatNumber } from '../../words/numbers.ts';
import { placeOf } from './geometry.ts';
import type { CordScale } from './types.ts';

/** Follow-up over eight weeks is read in weeks. */
export function cordUnit(scale: CordScale): 'weeks' | 'days' {
  return scale.to - scale.from > 56 ? 'weeks' : 'days';
}

function ticksOf(scale: CordScale): {
  unit: 'weeks' | 'days';
  ticks: { at: number; text: string }[];
} {
  const unit = cordUnit(scale);
  const weeks = unit === 'weeks';
  const length = weeks ? 7 : 1;
  const steps = weeks ? [1, 2, 4, 6, 12, 26, 52, 104] : [1, 2, 7, 14];
  const width = (scale.to - scale.from) / length;
  const step = steps.find((each) => width / each <= 6) ?? steps.at(-1) ?? 1;
  const first = Math.ceil(scale.from / length / step) * step;
  const ticks: { at: number; text: string }[] = [];
  for (let at = first; at <= scale.to / length + 1e-9; at += step)
    ticks.push({ at: at * length, text: formatNumber(at) });
  return { unit, ticks };
}

export function CordAxis({ scale, named = true }: { scale: CordScale; named?: boolean }) {
  const { unit, ticks } = ticksOf(scale);
  const words = chartsWords.cord;
  return (
    <div className="px-2">
      {named && (
        <div className="text-13 text-faded font-semibold">
          {unit === 'weeks' ? words.axisWeeks : words.axisDays}
        </div>
      )}
      <svg width="100%" height={18} className="block overflow-visible" aria-hidden="true">
        {ticks.map((tick) => (
          <text
            key={tick.at}
            x={`${placeOf(tick.at, scale)}%`}
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
    </div>
  );
}
