/** Every reason for which a row can be refused has its sentence in the refusal file and on the page. */
import { describe, expect, it } from 'vitest';
import { rowStudyCodes } from '../../api/features/imports/judge/judging.ts';
import { rowCellCodes } from '../../api/import-threads/cells.ts';
import { rowRefusalWords } from '../../api/words/imports.ts';
import { importWords, rowReasons } from '../../web/words/imports.ts';

const codes = [...rowCellCodes, ...rowStudyCodes].sort();

/** The `{name}` places of a sentence. */
const placesOf = (sentence: string) =>
  [...sentence.matchAll(/\{(\w+)\}/g)].map(([, name]) => name ?? '');

describe('reasons of refused rows', () => {
  it('have a sentence each, in the file and on the page, and no sentence stands alone', () => {
    expect(Object.keys(rowRefusalWords).sort()).toEqual(codes);
    expect(Object.keys(rowReasons).sort()).toEqual(codes);
  });

  it('fill no place on the page that the file does not know', () => {
    for (const [code, sentence] of Object.entries(rowReasons)) {
      if (typeof sentence === 'function') continue;
      const known = placesOf(rowRefusalWords[code as keyof typeof rowRefusalWords]);
      for (const place of placesOf(sentence)) expect(known, code).toContain(place);
    }
  });
});

describe('the figures of a dry run', () => {
  const { outcome } = importWords;

  it('agree with their number', () => {
    expect([outcome.known(1), outcome.known(2)]).toEqual([
      '1 row is known already and changes nothing.',
      '2 rows are known already and change nothing.',
    ]);
    expect([outcome.refused(1), outcome.refused(2)]).toEqual([
      '1 row is refused; the reason stands below.',
      '2 rows are refused; the reasons stand below.',
    ]);
    expect([outcome.implausible(1), outcome.implausible(2)]).toEqual([
      '1 value lies outside the plausible range.',
      '2 values lie outside the plausible range.',
    ]);
  });
});
