/** All paths on a canvas, for as many subjects as SVG would grow slow with. Axes and lines stay SVG above. */
import { useEffect, useRef, useState } from 'react';
import type { Size } from '../picture/types.ts';
import { type Layout, pathOf } from './layout.ts';
import { isShort } from './paths.tsx';
import type { DrawAs, SpaghettiSubject } from './types.ts';

/** Counts up when the theme changes: a canvas does not follow custom properties by itself. */
function useThemeTurns(): number {
  const [turns, setTurns] = useState(0);
  useEffect(() => {
    const turn = () => setTurns((before) => before + 1);
    const watch = new MutationObserver(turn);
    watch.observe(document.documentElement, { attributeFilter: ['data-theme'] });
    const system = matchMedia('(prefers-color-scheme: dark)');
    system.addEventListener('change', turn);
    return () => {
      watch.disconnect();
      system.removeEventListener('change', turn);
    };
  }, []);
  return turns;
}

/** Up to this many subjects are drawn at full strength. */
const CROWD = 250;

type Props = {
  subjects: readonly SpaghettiSubject[];
  as: DrawAs;
  layout: Layout;
  size: Size;
};

/** A new canvas for each theme, since the marks on one keep their colour. */
export function CanvasPaths(props: Props) {
  return <Canvas key={useThemeTurns()} {...props} />;
}

function Canvas(props: Props) {
  const { subjects, as, layout, size } = props;
  const ref = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const canvas = ref.current;
    const pen = canvas?.getContext('2d');
    if (!canvas || !pen) return;
    const fine = window.devicePixelRatio || 1;
    canvas.width = Math.round(size.width * fine);
    canvas.height = Math.round(size.height * fine);
    pen.scale(fine, fine);
    const style = getComputedStyle(canvas);
    // Among more paths each is drawn weaker, so that the pooled line is not drowned.
    const share = Math.max(0.25, Math.min(1, CROWD / subjects.length));
    const strength = (Number(style.getPropertyValue('--subject-opacity')) || 0.18) * share;
    pen.strokeStyle = style.color;
    pen.lineCap = 'round';
    for (const subject of subjects) {
      const path = pathOf(subject, as);
      const first = path[0];
      if (!first) continue;
      const alone = path.length === 1;
      const short = as === 'own lines' && isShort(subject, layout);
      pen.globalAlpha = short ? strength * 0.55 : strength;
      pen.lineWidth = alone ? 4 : 1;
      pen.setLineDash(as === 'own lines' && subject.own?.n === 2 ? [5, 4] : []);
      pen.beginPath();
      pen.moveTo(layout.x(first.time), layout.y(first.value));
      for (const point of path) pen.lineTo(layout.x(point.time), layout.y(point.value));
      pen.stroke();
    }
  }, [subjects, as, layout, size.width, size.height]);
  return (
    <canvas
      ref={ref}
      className="absolute inset-0 text-ink"
      style={{ width: size.width, height: size.height }}
    />
  );
}
