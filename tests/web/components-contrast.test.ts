/** Contrast of every pair of colours in use, computed from the tokens themselves, in both themes. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const css = readFileSync(new URL('../../web/styles/tokens.css', import.meta.url), 'utf8');

type Tokens = Record<string, [number, number, number]>;

function tokensOf(block: string): Tokens {
  const tokens: Tokens = {};
  for (const [, name, l, c, h] of block.matchAll(
    /--color-([a-z0-9-]+): oklch\(([\d.]+) ([\d.]+)(?: ([\d.]+))?\)/g,
  )) {
    if (name) tokens[name] = [Number(l), Number(c), Number(h ?? 0)];
  }
  return tokens;
}

const [lightBlock = '', darkBlock = ''] = css.split('@media screen');
const light = tokensOf(lightBlock);
const dark = tokensOf(darkBlock);

/** OKLCH to linear sRGB, clipped to what a screen shows (Björn Ottosson's matrices). */
function linear([l, c, h]: [number, number, number]): [number, number, number] {
  const a = c * Math.cos((h * Math.PI) / 180);
  const b = c * Math.sin((h * Math.PI) / 180);
  const long = (l + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const medium = (l - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const short = (l - 0.0894841775 * a - 1.291485548 * b) ** 3;
  const clip = (value: number) => Math.min(1, Math.max(0, value));
  return [
    clip(4.0767416621 * long - 3.3077115913 * medium + 0.2309699292 * short),
    clip(-1.2684380046 * long + 2.6097574011 * medium - 0.3413193965 * short),
    clip(-0.0041960863 * long - 0.7034186147 * medium + 1.707614701 * short),
  ];
}

function luminance(tokens: Tokens, name: string): number {
  const token = tokens[name];
  if (!token) throw new Error(`no colour ${name}`);
  const [r, g, b] = linear(token);
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** WCAG 2.2 contrast ratio. */
function contrast(tokens: Tokens, one: string, other: string): number {
  const [high = 0, low = 0] = [luminance(tokens, one), luminance(tokens, other)].sort(
    (a, b) => b - a,
  );
  return (high + 0.05) / (low + 0.05);
}

const TEXT = ['ink', 'faded', 'kelp', 'flare-ink', 'stop'];
const MARKS = ['edge', 'kelp', 'flare', 'stop', 'code-1', 'code-2', 'code-3'];
const GROUNDS = ['surface', 'panel'];

describe.each([
  ['light', light],
  ['dark', dark],
] as const)('the %s theme', (_name, tokens) => {
  it.each(TEXT.flatMap((text) => GROUNDS.map((ground) => [text, ground] as const)))(
    'writes %s on %s at 4.5 to 1 or more',
    (text, ground) => {
      expect(contrast(tokens, text, ground)).toBeGreaterThanOrEqual(4.5);
    },
  );

  it('writes the filled button at 4.5 to 1 or more', () => {
    expect(contrast(tokens, 'surface', 'kelp')).toBeGreaterThanOrEqual(4.5);
  });

  it.each(MARKS.flatMap((mark) => GROUNDS.map((ground) => [mark, ground] as const)))(
    'draws %s on %s at 3 to 1 or more',
    (mark, ground) => {
      expect(contrast(tokens, mark, ground)).toBeGreaterThanOrEqual(3);
    },
  );
});

it('names the same colours in both themes', () => {
  expect(Object.keys(dark).sort()).toEqual(Object.keys(light).sort());
});

it('computes the contrast of known colours', () => {
  const known: Tokens = { black: [0, 0, 0], white: [1, 0, 0] };
  expect(contrast(known, 'black', 'white')).toBeCloseTo(21, 5);
});
