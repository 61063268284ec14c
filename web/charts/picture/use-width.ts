import { useLayoutEffect, useRef, useState } from 'react';

/** The width of an element, followed while the page changes. */
export function useWidth<Kind extends HTMLElement>(first: number) {
  const ref = useRef<Kind>(null);
  const [width, setWidth] = useState(first);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    const follow = () => {
      const now = Math.floor(element.clientWidth);
      if (now > 0) setWidth(now);
    };
    follow();
    const observer = new ResizeObserver(follow);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width] as const;
}
