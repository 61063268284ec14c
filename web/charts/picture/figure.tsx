/** A picture on a page: its title, its marks, the same finding in words, its table twin and its files. */
import type { ReactElement, ReactNode } from 'react';
import { useId, useState } from 'react';
import { chartsWords } from '../../words/charts.ts';
import { type FileKind, pictureFile, saveBlob } from '../export/files.tsx';
import { TwinTable } from './twin-table.tsx';
import type { Picture, Size } from './types.ts';
import { useWidth } from './use-width.ts';

const words = chartsWords.figure;
const FILE_WIDTH = 960;
const FIRST_WIDTH = 720;

type Props = {
  picture: Picture;
  /** The marks at a size, as a page or a file needs them. */
  marks: (size: Size) => ReactElement;
  /** The height that suits a width. */
  heightFor: (width: number) => number;
  /** What the page shows instead of bare marks: the same marks with picking, or a table that holds them. */
  page?: (size: Size) => ReactElement;
  level?: 2 | 3;
  /** Choices that change the picture, at the left of the line above it. */
  controls?: ReactNode;
  /** Shown under the picture: legends, notes. */
  children?: ReactNode;
};

export function Figure({
  picture,
  marks,
  heightFor,
  page = marks,
  level = 2,
  controls,
  children,
}: Props) {
  const [box, width] = useWidth<HTMLDivElement>(FIRST_WIDTH);
  const [asTable, setAsTable] = useState(false);
  const title = useId();
  const Heading = level === 2 ? 'h2' : 'h3';
  const inner = { width: FILE_WIDTH, height: heightFor(FILE_WIDTH) };
  return (
    <figure aria-labelledby={title} className="min-w-0">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <Heading id={title} className="text-17 font-semibold">
          {picture.title}
        </Heading>
        <FileLine
          picture={picture}
          asTable={asTable}
          onTable={() => setAsTable(!asTable)}
          make={(kind) => pictureFile(kind, picture, inner, marks)}
        />
      </div>
      {controls && (
        <div className="no-print mt-1 flex flex-wrap items-center gap-x-6 gap-y-1">{controls}</div>
      )}
      <div ref={box} className="mt-2">
        {asTable ? (
          <TwinTable table={picture.table} title={picture.title} stamp={picture.stamp} />
        ) : (
          page({ width, height: heightFor(width) })
        )}
      </div>
      {children}
      <figcaption className="mt-2 max-w-text text-13 text-faded">{picture.text}</figcaption>
    </figure>
  );
}

function FileLine(props: {
  picture: Picture;
  asTable: boolean;
  onTable: () => void;
  make: (kind: FileKind) => Promise<Blob>;
}) {
  const [open, setOpen] = useState(false);
  const [said, setSaid] = useState('');
  const list = useId();
  const save = async (kind: FileKind) => {
    setSaid(words.making);
    try {
      const name = `${props.picture.fileName}.${kind}`;
      saveBlob(name, await props.make(kind));
      setSaid(words.made(name));
    } catch (cause) {
      console.error(cause);
      setSaid(words.failed);
    }
  };
  return (
    <div className="no-print ml-auto flex flex-wrap items-center gap-x-2 text-13">
      <span role="status" className="text-faded">
        {said}
      </span>
      {open && (
        <ul id={list} aria-label={words.files} className="flex gap-x-2">
          {(['svg', 'png', 'csv'] as const).map((kind) => (
            <li key={kind}>
              <button type="button" className="button button-quiet" onClick={() => save(kind)}>
                {words.kinds[kind]}
              </button>
            </li>
          ))}
        </ul>
      )}
      <button
        type="button"
        className="button button-quiet"
        aria-expanded={open}
        aria-controls={open ? list : undefined}
        onClick={() => setOpen(!open)}
      >
        {words.export}
      </button>
      <button type="button" className="button button-quiet" onClick={props.onTable}>
        {props.asTable ? words.asPicture : words.asTable}
      </button>
    </div>
  );
}
