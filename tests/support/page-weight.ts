import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';

interface Part {
  file: string;
  imports?: string[];
  dynamicImports?: string[];
}

type Manifest = Readonly<Record<string, Part>>;

/** What a browser fetches for a page that nothing has loaded before. */
export interface PageWeight {
  /** Files of script, each once. */
  files: string[];
  gzipBytes: number;
}

/**
 * Reckons the scripts of a page from the build's own record of which part needs which.
 * @param sources the sources whose parts are loaded, as the manifest names them: the entry, and pages on demand
 * @throws Error where the build does not know a source
 */
export function scriptWeight(webFolder: string, sources: readonly string[]): PageWeight {
  const manifest = readManifest(webFolder);
  const files = new Set<string>();
  const visit = (name: string): void => {
    const part = manifest[name];
    if (!part) throw new Error(`the build holds no part for ${name}`);
    if (files.has(part.file)) return;
    files.add(part.file);
    for (const needed of part.imports ?? []) visit(needed);
  };
  for (const source of sources) visit(source);
  const scripts = [...files].filter((file) => file.endsWith('.js'));
  const gzipBytes = scripts
    .map((file) => gzipSync(readFileSync(join(webFolder, file))).length)
    .reduce((sum, bytes) => sum + bytes, 0);
  return { files: scripts, gzipBytes };
}

/** The file of a page that is loaded on demand. */
export function fileOf(webFolder: string, source: string): string {
  const part = readManifest(webFolder)[source];
  if (!part) throw new Error(`the build holds no part for ${source}`);
  return part.file;
}

function readManifest(webFolder: string): Manifest {
  return JSON.parse(readFileSync(join(webFolder, '.vite/manifest.json'), 'utf8')) as Manifest;
}
