/** Axes as all our pictures have them: a name with its unit, figures in mono, quiet lines. */
import type { ReactNode } from 'react';
import type { Tick } from './ticks.ts';

export const AXIS_TEXT = 13;
const FIGURE = {
  fontSize: AXIS_TEXT,
  fontFamily: 'var(--font-mono)',
  fill: 'var(--color-faded)',
} as const;
const NAME = {
  fontSize: AXIS_TEXT,
  fontFamily: 'var(--font-sans)',
  fill: 'var(--color-faded)',
} as const;

type Along = (value: number) => number;

export function LeftAxis(props: {
  ticks: readonly Tick[];
  y: Along;
  from: number;
  to: number;
  name: string;
  nameAt: number;
}) {
  return (
    <g>
      <text x={0} y={props.nameAt} {...NAME}>
        {props.name}
      </text>
      {props.ticks.map((tick) => (
        <g key={tick.at}>
          <line
            x1={props.from}
            x2={props.to}
            y1={r(props.y(tick.at))}
            y2={r(props.y(tick.at))}
            stroke="var(--color-line)"
          />
          <text x={props.from - 8} y={r(props.y(tick.at))} dy="0.33em" textAnchor="end" {...FIGURE}>
            {tick.text}
          </text>
        </g>
      ))}
    </g>
  );
}

/** A row of figures under a picture: the axis itself, or the numbers of readings or pairs below it. */
export function FigureRow(props: {
  ticks: readonly Tick[];
  x: Along;
  y: number;
  label?: string;
  labelAt?: number;
}) {
  return (
    <g>
      {props.label !== undefined && (
        <text x={props.labelAt ?? 0} y={props.y} textAnchor="end" {...FIGURE}>
          {props.label}
        </text>
      )}
      {props.ticks.map((tick) => (
        <text key={tick.at} x={r(props.x(tick.at))} y={props.y} textAnchor="middle" {...FIGURE}>
          {tick.text}
        </text>
      ))}
    </g>
  );
}

export function AxisName({ x, y, children }: { x: number; y: number; children: ReactNode }) {
  return (
    <text x={r(x)} y={y} textAnchor="middle" {...NAME}>
      {children}
    </text>
  );
}

/** Two decimals of a pixel are more than any screen shows, and keep files small. */
export function r(value: number): number {
  return Math.round(value * 100) / 100;
}
