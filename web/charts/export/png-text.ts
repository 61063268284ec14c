/** Words inside a PNG file (PNG specification, chunk iTXt), so that a stamp outlives a cropped picture. */
const CRC = Uint32Array.from({ length: 256 }, (_, index) => {
  let value = index;
  for (let bit = 0; bit < 8; bit += 1) value = value & 1 ? 0xedb88320 ^ (value >>> 1) : value >>> 1;
  return value >>> 0;
});

function crc(bytes: Uint8Array): number {
  let value = 0xffffffff;
  for (const byte of bytes) value = (CRC[(value ^ byte) & 0xff] ?? 0) ^ (value >>> 8);
  return (value ^ 0xffffffff) >>> 0;
}

function chunk(keyword: string, text: string): Uint8Array {
  const encoder = new TextEncoder();
  // Keyword, then: end, not compressed, no method, no language, no translated keyword.
  const body = encoder.encode(`iTXt${keyword}\0\0\0\0\0${text}`);
  const bytes = new Uint8Array(body.length + 8);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, body.length - 4);
  bytes.set(body, 4);
  view.setUint32(bytes.length - 4, crc(body));
  return bytes;
}

/** Puts words in front of the end of a PNG file. @throws RangeError where the bytes are no PNG */
export function withPngText(png: Uint8Array, words: Readonly<Record<string, string>>): Uint8Array {
  const end = png.length - 12;
  if (png[0] !== 0x89 || png[1] !== 0x50 || end < 8)
    throw new RangeError('These bytes are no PNG.');
  const chunks = Object.entries(words)
    .filter(([, text]) => text !== '')
    .map(([keyword, text]) => chunk(keyword, text));
  const added = chunks.reduce((sum, each) => sum + each.length, 0);
  const out = new Uint8Array(png.length + added);
  out.set(png.subarray(0, end));
  let at = end;
  for (const each of chunks) {
    out.set(each, at);
    at += each.length;
  }
  out.set(png.subarray(end), at);
  return out;
}
