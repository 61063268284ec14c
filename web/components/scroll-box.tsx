import { type ReactNode, useRef } from 'react';
import { useOverflow } from './data-table/use-overflow.ts';

/** A table that may be wider than the page: it scrolls in its place, and then the keyboard reaches it. */
export function ScrollBox({ label, children }: { label: string; children: ReactNode }) {
  const frame = useRef<HTMLDivElement>(null);
  const wide = useOverflow(frame);
  return (
    <div
      ref={frame}
      className="overflow-x-auto"
      {...(wide ? { role: 'region', tabIndex: 0, 'aria-label': label } : {})}
    >
      {children}
    </div>
  );
}
