/** The files that a picture leaves as, opened again. */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Papa from 'papaparse';
import { chromium } from 'playwright-core';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { csvFile } from '../../web/charts/export/csv-file.ts';
import { PALETTE } from '../../web/charts/export/palette.ts';
import { rasterise } from '../../web/charts/export/png-file.ts';
import { withPngText } from '../../web/charts/export/png-text.ts';
import { Sheet, sheetSize } from '../../web/charts/export/sheet.tsx';
import { svgFile } from '../../web/charts/export/svg-file.ts';
import { SpaghettiMarks } from '../../web/charts/spaghetti/marks.tsx';
import { spaghettiTable } from '../../web/charts/spaghetti/table.ts';
import { findChromium } from '../support/chromium.ts';
import { pictureOf, six, stampWords } from './charts-data.ts';

const inner = { width: 960, height: 520 };
const state = { as: 'readings', many: null, picked: 'id-2', hovered: null } as const;

function pictureAs(stamp: string | null) {
  const picture = { ...pictureOf(stamp), table: spaghettiTable(six, 'readings') };
  const markup = renderToStaticMarkup(
    <Sheet picture={picture} inner={inner}>
      <SpaghettiMarks data={six} size={inner} state={state} stamp={stamp} />
    </Sheet>,
  );
  return {
    picture,
    svg: svgFile(markup, {
      sans: 'data:font/woff2;base64,AAAA',
      mono: 'data:font/woff2;base64,BBBB',
    }),
  };
}

/** The text chunks of a PNG, by keyword; reads lengths and checks the signature as any viewer does. */
function textsOf(png: Uint8Array): Record<string, string> {
  const view = new DataView(png.buffer, png.byteOffset, png.byteLength);
  const texts: Record<string, string> = {};
  for (let at = 8; at < png.length; ) {
    const length = view.getUint32(at);
    const type = new TextDecoder('latin1').decode(png.subarray(at + 4, at + 8));
    if (type === 'iTXt') {
      const body = new TextDecoder().decode(png.subarray(at + 8, at + 8 + length));
      const [keyword = ''] = body.split('\0');
      texts[keyword] = body.slice(keyword.length + 5);
    }
    at += length + 12;
  }
  return texts;
}

describe('SVG', () => {
  it('stands alone: no property of the page, no class, type faces inside', () => {
    const { svg } = pictureAs(null);
    expect(svg).not.toMatch(/var\(--/);
    expect(svg).not.toContain('class=');
    expect(svg).toContain("font-family:'Atkinson Hyperlegible Next'");
    expect(svg).toContain('xmlns="http://www.w3.org/2000/svg"');
    expect(svg).toContain(PALETTE.kelp);
    expect(svg).not.toContain(stampWords);
  });

  it('carries its title, what it was made from and the stamp', () => {
    const { svg, picture } = pictureAs(stampWords);
    expect(svg).toContain(`>${picture.title}</text>`);
    expect(svg).toContain(`>${picture.source}</text>`);
    expect(svg).toMatch(new RegExp(`<text[^>]*>${stampWords}</text>`));
    expect(svg).toContain(`<desc>${stampWords}.`);
  });

  it('refuses a colour that files do not know', () => {
    expect(() => svgFile('<svg fill="var(--color-beige)"></svg>', null)).toThrow('beige');
  });

  it('has the colours of the light theme', () => {
    const tokens = readFileSync('web/styles/tokens.css', 'utf8');
    const light = tokens.slice(0, tokens.indexOf('data-theme="dark"'));
    const found = [...light.matchAll(/--color-([a-z0-9-]+): oklch\(([\d. ]+)\)/g)];
    expect(found.length).toBe(Object.keys(PALETTE).length);
    for (const [, name = '', figures = ''] of found)
      expect([name, PALETTE[name]]).toEqual([name, hexOf(figures.split(' ').map(Number))]);
  });
});

/** OKLCH to sRGB (Ottosson 2020). */
function hexOf([lightness = 0, chroma = 0, hue = 0]: number[]): string {
  const a = chroma * Math.cos((hue * Math.PI) / 180);
  const b = chroma * Math.sin((hue * Math.PI) / 180);
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  return `#${[
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ]
    .map((part) => Math.min(1, Math.max(0, part)))
    .map((part) => (part <= 0.0031308 ? 12.92 * part : 1.055 * part ** (1 / 2.4) - 0.055))
    .map((part) =>
      Math.round(part * 255)
        .toString(16)
        .padStart(2, '0'),
    )
    .join('')}`;
}

describe('CSV', () => {
  it('has a stamp column exactly where the picture is stamped', () => {
    const table = spaghettiTable(six, 'readings');
    const stamped = Papa.parse<string[]>(csvFile(table, stampWords).trim()).data;
    expect(stamped[0]).toEqual([
      'subject',
      'visit',
      'weeks since baseline',
      'sway path, cm',
      'stamp',
    ]);
    expect(new Set(stamped.slice(1).map((row) => row[4]))).toEqual(new Set([stampWords]));
    expect(stamped).toHaveLength(23);
    const plain = Papa.parse<string[]>(csvFile(table, null).trim()).data;
    expect(plain[0]).toHaveLength(4);
  });

  it('is safe in a spreadsheet', () => {
    const csv = csvFile(
      {
        columns: [
          { name: 'subject', numeric: false },
          { name: 'value', numeric: true },
        ],
        rows: [
          ['=1+1', -2.5],
          ['@a', null],
          ['say "so", twice', Number.NaN],
        ],
      },
      null,
    );
    expect(csv).toBe('subject,value\r\n\'=1+1,-2.5\r\n\'@a,\r\n"say ""so"", twice",\r\n');
  });
});

describe('PNG', () => {
  it('is drawn with the stamp, in pixels and in words', async () => {
    const home = mkdtempSync(join(tmpdir(), 'charts-'));
    const browser = await chromium.launch({
      executablePath: findChromium(),
      args: ['--no-sandbox', '--disable-gpu'],
      env: { ...process.env, HOME: home },
    });
    try {
      const page = await browser.newPage();
      const render = async (stamp: string | null) => {
        const { svg, picture } = pictureAs(stamp);
        const size = sheetSize(picture, inner);
        const text = await page.evaluate<string>(
          `(${rasterise.toString()})(${JSON.stringify(svg)}, ${JSON.stringify(size)})
            .then((bytes) => btoa(bytes.reduce((all, byte) => all + String.fromCharCode(byte), '')))`,
        );
        return withPngText(Uint8Array.from(Buffer.from(text, 'base64')), {
          Title: picture.title,
          Warning: stamp ?? '',
        });
      };
      const flarePixels = (png: Uint8Array) =>
        page.evaluate(async (text) => {
          const file = await fetch(`data:image/png;base64,${text}`);
          const image = await createImageBitmap(await file.blob());
          const canvas = new OffscreenCanvas(image.width, image.height);
          const pen = canvas.getContext('2d');
          if (!pen) return -1;
          pen.drawImage(image, 0, 0);
          // The upper right quarter, where the stamp stands.
          const x = Math.round(image.width / 2);
          const { data } = pen.getImageData(x, 0, image.width - x, Math.round(image.height / 2));
          let found = 0;
          for (let at = 0; at < data.length; at += 4)
            if (data[at] === 0x90 && data[at + 1] === 0x3a && data[at + 2] === 0x03) found += 1;
          return found;
        }, Buffer.from(png).toString('base64'));
      const stamped = await render(stampWords);
      expect(textsOf(stamped)).toEqual({ Title: pictureOf(null).title, Warning: stampWords });
      expect(await flarePixels(stamped)).toBeGreaterThan(500);
      const plain = await render(null);
      expect(textsOf(plain)).toEqual({ Title: pictureOf(null).title });
      expect(await flarePixels(plain)).toBe(0);
    } finally {
      await browser.close();
      rmSync(home, { recursive: true, force: true });
    }
  }, 60_000);

  it('refuses to put words into what is no PNG', () => {
    expect(() => withPngText(new Uint8Array(40), { Warning: stampWords })).toThrow('no PNG');
  });
});
