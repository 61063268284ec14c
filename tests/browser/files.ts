/** Opens files as the programs of their readers do, and says what stands in them. */
import type { Page } from 'playwright-core';

/** The words that travel inside a PNG, by keyword (PNG specification, chunk iTXt, not compressed). */
export function wordsInPng(bytes: Buffer): Record<string, string> {
  const found: Record<string, string> = {};
  for (let at = 8; at < bytes.length; ) {
    const length = bytes.readUInt32BE(at);
    const body = bytes.subarray(at + 8, at + 8 + length);
    if (bytes.toString('latin1', at + 4, at + 8) === 'iTXt') {
      const end = body.indexOf(0);
      // Behind the keyword: its end, two figures, and two texts that are empty, each with its end.
      found[body.toString('latin1', 0, end)] = body.toString('utf8', end + 5);
    }
    at += length + 12;
  }
  return found;
}

/** Draws a PNG and counts the pixels of one colour in its right upper quarter, where a stamp stands. */
export function pixelsAtTopRight(page: Page, png: Buffer, colour: string): Promise<number> {
  return page.evaluate(
    async ({ base64, wanted }) => {
      const picture = new Image();
      picture.src = `data:image/png;base64,${base64}`;
      await picture.decode();
      const canvas = document.createElement('canvas');
      canvas.width = picture.naturalWidth;
      canvas.height = picture.naturalHeight;
      const pen = canvas.getContext('2d');
      if (!pen) throw new Error('no canvas');
      pen.drawImage(picture, 0, 0);
      const half = Math.floor(canvas.width / 2);
      const { data } = pen.getImageData(
        half,
        0,
        canvas.width - half,
        Math.floor(canvas.height / 4),
      );
      let count = 0;
      for (let at = 0; at < data.length; at += 4) {
        const hex = [0, 1, 2].map((part) => (data[at + part] ?? 0).toString(16).padStart(2, '0'));
        if (`#${hex.join('')}` === wanted) count += 1;
      }
      return count;
    },
    { base64: png.toString('base64'), wanted: colour },
  );
}

/** The texts that an SVG shows, read by the browser's own parser. @throws Error where it is no SVG */
export function textsInSvg(page: Page, svg: Buffer): Promise<string[]> {
  return page.evaluate((source) => {
    const parsed = new DOMParser().parseFromString(source, 'image/svg+xml');
    if (parsed.querySelector('parsererror') || parsed.documentElement.localName !== 'svg')
      throw new Error('not an SVG');
    return [...parsed.querySelectorAll('text')].map((text) => text.textContent ?? '');
  }, svg.toString('utf8'));
}
