/** The stamp of an ordinary fit to repeated readings, top right of a picture. */
import { textWidth } from './text.ts';

export const STAMP_HEIGHT = 32;

export function StampMark({ text, right }: { text: string | null; right: number }) {
  if (!text) return null;
  const width = Math.ceil(textWidth(text, 13) + 24);
  return (
    <g data-stamp="true">
      <rect
        x={right - width - 1}
        y={1}
        width={width}
        height={23}
        rx={3}
        fill="none"
        stroke="var(--color-flare-ink)"
        strokeWidth={1.5}
      />
      <text
        x={right - width / 2 - 1}
        y={17}
        textAnchor="middle"
        fontSize={13}
        fontWeight={600}
        fontFamily="var(--font-sans)"
        fill="var(--color-flare-ink)"
      >
        {text}
      </text>
    </g>
  );
}
