import { type RefObject, useLayoutEffect, useState } from 'react';

/**
 * True while the table is wider than its place: then it scrolls in a box of its own, with a sticky
 * head and first column. Otherwise the head sticks to the window.
 */
export function useOverflow(frame: RefObject<HTMLElement | null>): boolean {
  const [wide, setWide] = useState(false);
  useLayoutEffect(() => {
    const element = frame.current;
    const table = element?.querySelector('table');
    if (!element || !table) return;
    const look = () => setWide(table.scrollWidth > element.clientWidth + 1);
    const observer = new ResizeObserver(look);
    observer.observe(element);
    observer.observe(table);
    look();
    return () => observer.disconnect();
  }, [frame]);
  return wide;
}
