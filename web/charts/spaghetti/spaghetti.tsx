/** The spaghetti plot on a page: how to draw the subjects, which of them is picked, and its files. */
import { useMemo, useState } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { Choice } from '../picture/choice.tsx';
import { Figure } from '../picture/figure.tsx';
import { PickField } from '../picture/pick-field.tsx';
import { PickArea } from '../picture/picking.tsx';
import type { Picture, Size } from '../picture/types.ts';
import { CanvasPaths } from './canvas-paths.tsx';
import { Key } from './key.tsx';
import { layoutOf } from './layout.ts';
import { SpaghettiMarks, type SpaghettiState } from './marks.tsx';
import { nearestIn, spotsOf } from './nearest.ts';
import { spaghettiTable } from './table.ts';
import {
  type DrawAs,
  type DrawMany,
  MANY_MARKS,
  MANY_SUBJECTS,
  type SpaghettiData,
} from './types.ts';

const words = chartsWords.spaghetti;

type Props = {
  data: SpaghettiData;
  picture: Omit<Picture, 'table'>;
  picked: string | null;
  onPick: (id: string | null) => void;
  level?: 2 | 3;
};

export function Spaghetti({ data, picture, picked, onPick, level }: Props) {
  const [as, setAs] = useState<DrawAs>('readings');
  const crowded = data.subjects.length > MANY_SUBJECTS;
  const [many, setMany] = useState<DrawMany>('ribbons');
  const [hovered, setHovered] = useState<string | null>(null);
  const table = useMemo(() => spaghettiTable(data, as), [data, as]);
  const state: SpaghettiState = { as, many: crowded ? many : null, picked, hovered };
  const byLevel = useMemo(() => orderOf(data), [data]);
  return (
    <Figure
      level={level}
      picture={{ ...picture, table }}
      heightFor={(width) =>
        Math.round(Math.min(520, Math.max(width * 0.62, width * 0.75 - 120, 300)))
      }
      marks={(size) => (
        <SpaghettiMarks
          data={data}
          size={size}
          state={{ ...state, hovered: null }}
          stamp={picture.stamp}
        />
      )}
      page={(size) => (
        <Live
          data={data}
          size={size}
          state={state}
          stamp={picture.stamp}
          order={byLevel}
          onPick={onPick}
          onHover={setHovered}
        />
      )}
      controls={
        <>
          {(!crowded || many === 'every path') && (
            <Choice
              legend={words.drawAs}
              value={as}
              onChange={setAs}
              options={[
                { value: 'readings', text: words.readings },
                { value: 'own lines', text: words.ownLines },
              ]}
            />
          )}
          {crowded && (
            <Choice
              legend={words.manyAs}
              value={many}
              onChange={setMany}
              options={[
                { value: 'ribbons', text: words.ribbons },
                { value: 'every path', text: words.everyPath },
              ]}
            />
          )}
          <PickField order={data.subjects} picked={picked} onPick={onPick} />
        </>
      }
    >
      <Key data={data} as={as} ribbons={state.many === 'ribbons'} />
    </Figure>
  );
}

/** Subjects from the lowest mean reading to the highest: an arrow key goes to the neighbour in the picture. */
function orderOf(data: SpaghettiData) {
  return data.subjects
    .map((subject) => ({
      id: subject.id,
      code: subject.code,
      mean:
        subject.readings.reduce((sum, reading) => sum + reading.value, 0) /
        Math.max(1, subject.readings.length),
    }))
    .sort((a, b) => a.mean - b.mean);
}

function Live(props: {
  data: SpaghettiData;
  size: Size;
  state: SpaghettiState;
  stamp: string | null;
  order: readonly { id: string; code: string }[];
  onPick: (id: string | null) => void;
  onHover: (id: string | null) => void;
}) {
  const { data, state, stamp } = props;
  const { width, height } = props.size;
  const size = useMemo(() => ({ width, height }), [width, height]);
  const layout = useMemo(() => layoutOf(data, size, stamp !== null), [data, size, stamp]);
  const spots = useMemo(() => spotsOf(data.subjects, state.as, layout), [data, state.as, layout]);
  const readings = data.subjects.reduce((sum, subject) => sum + subject.readings.length, 0);
  const onCanvas = readings > MANY_MARKS && state.many !== 'ribbons';
  return (
    <PickArea
      label={words.pick}
      none={words.nonePicked}
      order={props.order}
      picked={state.picked}
      onPick={props.onPick}
      onHover={props.onHover}
      nearest={(x, y) => nearestIn(spots, x, y)}
    >
      {onCanvas && (
        <CanvasPaths subjects={data.subjects} as={state.as} layout={layout} size={size} />
      )}
      <SpaghettiMarks data={data} size={size} state={state} stamp={stamp} pathsBelow={onCanvas} />
    </PickArea>
  );
}
