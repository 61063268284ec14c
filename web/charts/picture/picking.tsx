/** Picking a subject from inside a picture: by click, by arrow keys, by typing a code. Esc clears. */
import type { KeyboardEvent, PointerEvent, ReactNode } from 'react';
import { useRef } from 'react';

export type Pickable = { id: string; code: string };

type Props = {
  label: string;
  none: string;
  /** In the order in which the arrow keys go; the picture chooses one that can be seen. */
  order: readonly Pickable[];
  picked: string | null;
  onPick: (id: string | null) => void;
  /** The subject nearest to a place in the picture, in px from its upper left corner. */
  nearest: (x: number, y: number) => string | null;
  onHover?: (id: string | null) => void;
  children: ReactNode;
};

/** Letters typed within this time belong to one code. */
const TYPING_MS = 1200;

export function PickArea(props: Props) {
  const typed = useRef({ text: '', at: 0 });
  const index = props.order.findIndex((each) => each.id === props.picked);
  const step = (by: number) => {
    const last = props.order.length - 1;
    const from = index < 0 ? (by > 0 ? -1 : last + 1) : index;
    const next = props.order[Math.min(last, Math.max(0, from + by))];
    if (next) props.onPick(next.id);
  };
  const type = (letter: string, now: number) => {
    const before = now - typed.current.at < TYPING_MS ? typed.current.text : '';
    typed.current = { text: (before + letter).toLowerCase(), at: now };
    const found = props.order.find((each) =>
      each.code.toLowerCase().startsWith(typed.current.text),
    );
    if (found) props.onPick(found.id);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const by = STEPS[event.key];
    if (by !== undefined) step(by);
    else if (event.key === 'Escape') props.onPick(null);
    else if (event.key === 'Home') step(-props.order.length);
    else if (event.key === 'End') step(props.order.length);
    else if (/^[A-Za-z0-9._-]$/.test(event.key)) type(event.key, event.timeStamp);
    else return;
    event.preventDefault();
  };
  const at = (event: PointerEvent) => {
    const box = event.currentTarget.getBoundingClientRect();
    return props.nearest(event.clientX - box.left, event.clientY - box.top);
  };
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label={props.label}
      aria-valuemin={0}
      aria-valuemax={props.order.length}
      aria-valuenow={index + 1}
      aria-valuetext={props.order[index]?.code ?? props.none}
      className="relative cursor-crosshair touch-pan-y"
      onKeyDown={onKeyDown}
      onPointerMove={(event) => props.onHover?.(at(event))}
      onPointerLeave={() => props.onHover?.(null)}
      onPointerUp={(event) => {
        const found = at(event);
        props.onPick(found === props.picked ? null : found);
      }}
    >
      {props.children}
    </div>
  );
}

const STEPS: Readonly<Record<string, number>> = {
  ArrowUp: 1,
  ArrowRight: 1,
  ArrowDown: -1,
  ArrowLeft: -1,
  PageUp: 10,
  PageDown: -10,
};
