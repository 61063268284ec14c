/** Makes the markup of a picture stand alone: colours in figures, type faces inside, no class of the page. */
import { PALETTE } from './palette.ts';

export type Fonts = { sans: string; mono: string };

const SANS = 'Atkinson Hyperlegible Next';
const MONO = 'Atkinson Hyperlegible Mono';

function face(family: string, source: string): string {
  return `@font-face{font-family:'${family}';font-weight:200 800;src:url(${source}) format('woff2')}`;
}

/**
 * @param markup one `<svg>` element, as a page or a server writes it
 * @param fonts data URIs of our two type faces; without them a viewer's own sans serif stands in
 * @throws RangeError where a colour of the page has no figure here, so that no file turns black unseen
 */
export function svgFile(markup: string, fonts: Fonts | null): string {
  const plain = markup
    .replace(/\sclass="[^"]*"/g, '')
    .replace(/var\(--font-sans\)/g, `'${SANS}', sans-serif`)
    .replace(/var\(--font-mono\)/g, `'${MONO}', monospace`)
    .replace(/var\(--[a-z-]+, ([^()]+)\)/g, '$1')
    .replace(/var\(--color-([a-z0-9-]+)\)/g, (_, name: string) => {
      const colour = PALETTE[name];
      if (!colour) throw new RangeError(`No colour for files: ${name}`);
      return colour;
    });
  const named = /^<svg[^>]*\sxmlns=/.test(plain)
    ? plain
    : plain.replace('<svg', '<svg xmlns="http://www.w3.org/2000/svg"');
  const style = fonts ? `<style>${face(SANS, fonts.sans)}${face(MONO, fonts.mono)}</style>` : '';
  return `<?xml version="1.0" encoding="UTF-8"?>\n${named.replace(/^(<svg[^>]*>)/, `$1${style}`)}\n`;
}
