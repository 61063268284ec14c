/** Widths of text without a page to measure in: means of our two type faces at 1 px, rounded up. */
const SANS = 0.53;
const MONO = 0.61;

export function textWidth(text: string, size: number, face: 'sans' | 'mono' = 'sans'): number {
  return text.length * size * (face === 'mono' ? MONO : SANS);
}

/** Breaks a sentence into lines no wider than asked. */
export function wrapText(text: string, size: number, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line ? `${line} ${word}` : word;
    if (line && textWidth(longer, size) > width) {
      lines.push(line);
      line = word;
    } else line = longer;
  }
  if (line) lines.push(line);
  return lines;
}
