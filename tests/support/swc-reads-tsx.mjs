import { createRequire } from 'node:module';

/**
 * dependency-cruiser asks swc for plain TypeScript, also for files with JSX, where `<` then reads as a cast.
 * Loaded before it, this tells swc the truth about .tsx files.
 */
const swc = createRequire(import.meta.url)('@swc/core');
const parseFileSync = swc.parseFileSync.bind(swc);
swc.parseFileSync = (file, options) =>
  parseFileSync(file, { ...options, tsx: file.endsWith('.tsx') });
