import { describe, expect, inject, it } from 'vitest';
import { fileOf, scriptWeight } from '../support/page-weight.ts';

const LIMIT_BYTES = 250_000;
/** The sign-in page is part of the entry; nothing more is asked for before somebody signs in. */
const SIGN_IN = ['index.html'];

describe('the first load', () => {
  it('of the sign-in page is under 250 kB of script, packed', () => {
    const { files, gzipBytes } = scriptWeight(inject('webFolder'), SIGN_IN);
    expect(files.length).toBeGreaterThan(0);
    expect(gzipBytes).toBeGreaterThan(10_000);
    // React's build for development would be the first to break the limit.
    expect(files.join()).not.toContain('jsx-dev-runtime');
    expect(gzipBytes).toBeLessThan(LIMIT_BYTES);
  });

  it('holds no page of the analyst: those come when they are opened', () => {
    const webFolder = inject('webFolder');
    const { files } = scriptWeight(webFolder, SIGN_IN);
    for (const page of [
      'check/check-page',
      'fit/fit-page',
      'records/record-page',
      'cuts/cuts-page',
    ]) {
      expect(files).not.toContain(fileOf(webFolder, `features/${page}.tsx`));
    }
  });
});
