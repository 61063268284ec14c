/** The spaghetti plot itself: axes, subjects, pooled lines, the picked subject. Pure SVG. */
import { useMemo } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { AxisName, FigureRow, LeftAxis } from '../marks/axes.tsx';
import { StampMark } from '../marks/stamp-mark.tsx';
import type { Size } from '../picture/types.ts';
import { type Layout, layoutOf } from './layout.ts';
import { Ends, Highlight, Paths } from './paths.tsx';
import { labelsOf, Pooled } from './pooled.tsx';
import { Outlying, Ribbons } from './ribbon-marks.tsx';
import { outlyingOf, ribbonsOf } from './ribbons.ts';
import type { DrawAs, DrawMany, SpaghettiData } from './types.ts';

const words = chartsWords.spaghetti;

export type SpaghettiState = {
  as: DrawAs;
  many: DrawMany | null;
  picked: string | null;
  hovered: string | null;
};

export function SpaghettiMarks(props: {
  data: SpaghettiData;
  size: Size;
  state: SpaghettiState;
  stamp: string | null;
  /** Where a canvas below draws the paths. */
  pathsBelow?: boolean;
}) {
  const { data, size, state, stamp } = props;
  const layout = useMemo(() => layoutOf(data, size, stamp !== null), [data, size, stamp]);
  const ribbons = useMemo(
    () => (state.many === 'ribbons' ? ribbonsOf(data) : null),
    [data, state.many],
  );
  const outlying = useMemo(() => {
    if (state.many !== 'ribbons') return [];
    const ids = new Set(outlyingOf(data));
    return data.subjects.filter((subject) => ids.has(subject.id));
  }, [data, state.many]);
  const paths = useMemo(
    () =>
      ribbons || props.pathsBelow ? null : (
        <Paths subjects={data.subjects} as={state.as} layout={layout} />
      ),
    [data, state.as, layout, ribbons, props.pathsBelow],
  );
  const names = labelsOf(data.lines, layout, data.lineName);
  const shownOver = [state.hovered === state.picked ? null : state.hovered, state.picked];
  return (
    <svg
      width={size.width}
      height={size.height}
      aria-hidden="true"
      className="relative block overflow-visible"
      style={{ cursor: 'crosshair' }}
    >
      <StampMark text={stamp} right={size.width} />
      <LeftAxis
        ticks={layout.yTicks}
        y={layout.y}
        from={layout.left}
        to={layout.right}
        name={words.yName(data.measure, data.unit, layout.holdsZero)}
        nameAt={layout.nameAt}
      />
      {ribbons && <Ribbons points={ribbons} layout={layout} />}
      {paths}
      {outlying.length > 0 && <Outlying subjects={outlying} layout={layout} />}
      {!ribbons && <Ends subjects={data.subjects} as={state.as} layout={layout} />}
      <Pooled lines={data.lines} layout={layout} lineName={data.lineName} />
      {shownOver.map((id, index) => {
        const subject = id === null ? undefined : data.subjects.find((each) => each.id === id);
        return subject ? (
          <Highlight
            key={subject.id}
            subject={subject}
            as={state.as}
            layout={layout}
            hovered={index === 0}
            names={names}
          />
        ) : null;
      })}
      <Foot layout={layout} data={data} />
    </svg>
  );
}

function Foot({ layout, data }: { layout: Layout; data: SpaghettiData }) {
  return (
    <g>
      <FigureRow ticks={layout.xTicks} x={layout.x} y={layout.bottom + 20} />
      <FigureRow
        ticks={layout.nTicks}
        x={layout.x}
        y={layout.bottom + 40}
        label={words.n}
        labelAt={10}
      />
      <AxisName x={(layout.left + layout.right) / 2} y={layout.bottom + 61}>
        {data.timeName}
      </AxisName>
    </g>
  );
}
