/** A picture as it leaves the page: its title above, the picture, and what it was made from below. */
import type { ReactNode } from 'react';
import { wrapText } from '../marks/text.ts';
import type { Picture, Size } from '../picture/types.ts';

const PAD = 24;

export function sheetSize(picture: Picture, inner: Size): Size & { top: number } {
  const title = wrapText(picture.title, 17, inner.width).length;
  const source = wrapText(picture.source, 13, inner.width).length;
  const top = PAD + title * 24 + 8;
  return { top, width: inner.width + 2 * PAD, height: top + inner.height + 12 + source * 19 + PAD };
}

export function Sheet(props: { picture: Picture; inner: Size; children: ReactNode }) {
  const { picture, inner } = props;
  const size = sheetSize(picture, inner);
  return (
    <svg
      role="img"
      aria-label={picture.text}
      width={size.width}
      height={size.height}
      viewBox={`0 0 ${size.width} ${size.height}`}
    >
      <title>{picture.title}</title>
      <desc>{picture.stamp ? `${picture.stamp}. ${picture.text}` : picture.text}</desc>
      <rect width={size.width} height={size.height} fill="var(--color-panel)" />
      {wrapText(picture.title, 17, inner.width).map((line, index) => (
        <text
          key={line}
          x={PAD}
          y={PAD + 16 + index * 24}
          fontSize={17}
          fontWeight={600}
          fontFamily="var(--font-sans)"
          fill="var(--color-ink)"
        >
          {line}
        </text>
      ))}
      <g transform={`translate(${PAD} ${size.top})`}>{props.children}</g>
      {wrapText(picture.source, 13, inner.width).map((line, index) => (
        <text
          key={line}
          x={PAD}
          y={size.top + inner.height + 12 + 13 + index * 19}
          fontSize={13}
          fontFamily="var(--font-sans)"
          fill="var(--color-faded)"
        >
          {line}
        </text>
      ))}
    </svg>
  );
}
