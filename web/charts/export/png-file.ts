/** A picture as PNG, twice as fine as the screen's pixels. */
import type { Size } from '../picture/types.ts';
import { withPngText } from './png-text.ts';

/** Draws a stand-alone SVG on a canvas. The SVG holds its fonts, so the canvas stays readable. */
export async function rasterise(svg: string, size: Size, fine = 2): Promise<Uint8Array> {
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(size.width * fine);
  canvas.height = Math.round(size.height * fine);
  const pen = canvas.getContext('2d');
  if (!pen) throw new Error('This browser gives no canvas to draw on.');
  pen.drawImage(image, 0, 0, canvas.width, canvas.height);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
  if (!blob) throw new Error('This browser could not write the picture as PNG.');
  return new Uint8Array(await blob.arrayBuffer());
}

export async function pngFile(
  svg: string,
  size: Size,
  words: { title: string; source: string; stamp: string | null },
): Promise<Uint8Array> {
  return withPngText(await rasterise(svg, size), {
    Title: words.title,
    Description: words.source,
    Warning: words.stamp ?? '',
  });
}
