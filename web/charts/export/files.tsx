/** The files of a picture, made when asked for. */
import type { ReactElement } from 'react';
import { flushSync } from 'react-dom';
import { createRoot } from 'react-dom/client';
import type { Picture, Size } from '../picture/types.ts';
import { csvFile } from './csv-file.ts';
import { inlineFonts } from './fonts.ts';
import { pngFile } from './png-file.ts';
import { Sheet, sheetSize } from './sheet.tsx';
import { svgFile } from './svg-file.ts';

export type FileKind = 'svg' | 'png' | 'csv';

/** Draws apart from the page, so that a file has its own size and no state of the screen. */
function drawApart(picture: Picture, inner: Size, marks: ReactElement): string {
  const apart = document.createElement('div');
  const root = createRoot(apart);
  flushSync(() =>
    root.render(
      <Sheet picture={picture} inner={inner}>
        {marks}
      </Sheet>,
    ),
  );
  const svg = apart.querySelector('svg');
  const markup = svg ? new XMLSerializer().serializeToString(svg) : '';
  root.unmount();
  return markup;
}

export async function pictureFile(
  kind: FileKind,
  picture: Picture,
  inner: Size,
  marks: (size: Size) => ReactElement,
): Promise<Blob> {
  if (kind === 'csv')
    return new Blob([csvFile(picture.table, picture.stamp)], { type: 'text/csv;charset=utf-8' });
  const svg = svgFile(drawApart(picture, inner, marks(inner)), await inlineFonts());
  if (kind === 'svg') return new Blob([svg], { type: 'image/svg+xml' });
  const png = await pngFile(svg, sheetSize(picture, inner), picture);
  return new Blob([png.slice()], { type: 'image/png' });
}

export function saveBlob(name: string, blob: Blob): void {
  const address = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // The browser needs the address until the download has begun.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
