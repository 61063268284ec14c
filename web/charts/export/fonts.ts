/// <reference types="vite/client" />
/** Our type faces as data URIs, loaded only when a file is asked for. */
import type { Fonts } from './svg-file.ts';

export async function inlineFonts(): Promise<Fonts> {
  const [sans, mono] = await Promise.all([
    import(
      '@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-normal.woff2?inline'
    ),
    import(
      '@fontsource-variable/atkinson-hyperlegible-mono/files/atkinson-hyperlegible-mono-latin-wght-normal.woff2?inline'
    ),
  ]);
  return { sans: sans.default, mono: mono.default };
}
