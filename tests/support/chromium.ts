import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

/** The browser of the system: `$CHROMIUM_BIN`, else the first of its usual names on PATH. */
export function findChromium(): string | undefined {
  const folders = ['/usr/bin', ...(process.env.PATH ?? '').split(delimiter).filter(Boolean)];
  const candidates = [
    process.env.CHROMIUM_BIN,
    ...folders.flatMap((folder) => [join(folder, 'chromium'), join(folder, 'chromium-browser')]),
  ];
  return candidates.find((file) => file !== undefined && isProgram(file));
}

function isProgram(file: string): boolean {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}
