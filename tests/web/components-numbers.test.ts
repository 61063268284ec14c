import { describe, expect, it } from 'vitest';
import { toCsv } from '../../web/components/csv.ts';
import { compareCells } from '../../web/components/data-table/column.ts';
import { dayOf, formatDay, formatMoment } from '../../web/components/dates.ts';
import {
  counted,
  decimalsForError,
  formatDf,
  formatError,
  formatEstimate,
  formatInterval,
  formatLoose,
  formatNumber,
  formatP,
  formatShare,
} from '../../web/components/numbers.ts';

describe('numbers', () => {
  it('uses U+2212 for minus and none for what rounds to nothing', () => {
    expect(formatNumber(-0.061, 3)).toBe('\u22120.061');
    expect(formatNumber(-0.0004, 3)).toBe('0.000');
    expect(formatNumber(-0, 1)).toBe('0.0');
  });

  it('parts thousands by thin spaces past 9,999', () => {
    expect(formatNumber(9999)).toBe('9999');
    expect(formatNumber(10000)).toBe('10\u2009000');
    expect(formatNumber(1234567.891, 2)).toBe('1\u2009234\u2009567.89');
  });

  it('shows a dash for what is not a number', () => {
    for (const value of [null, undefined, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(formatNumber(value)).toBe('\u2014');
      expect(formatP(value)).toBe('\u2014');
      expect(formatLoose(value)).toBe('\u2014');
    }
  });

  it.each([
    [0.0176, 3],
    [0.62, 2],
    [1.546, 1],
    [12.3, 0],
    [123, 0],
    [0.0996, 2],
    [0.099, 3],
    [9.96, 0],
    [0.1, 2],
  ])('reads the digits from an error of %d', (error, decimals) => {
    expect(decimalsForError(error)).toBe(decimals);
  });

  it('prints an estimate with the digits of its error', () => {
    expect(formatEstimate(10.467286, 1.545848)).toBe('10.5');
    expect(formatError(1.545848)).toBe('1.5');
    expect(formatEstimate(-0.06123, 0.0098)).toBe('\u22120.0612');
    expect(formatEstimate(3.1427, null)).toBe('3.14');
    expect(formatEstimate(3.1427, 0)).toBe('3.14');
  });

  it('prints intervals, p values, degrees of freedom and shares', () => {
    expect(formatInterval(-0.0803, -0.0419, 0.0098)).toBe('\u22120.0803 to \u22120.0419');
    expect(formatInterval(null, 1)).toBe('\u2014');
    expect(formatP(0.03456)).toBe('0.035');
    expect(formatP(0.0009)).toBe('< 0.001');
    expect(formatP(0)).toBe('< 0.001');
    expect(formatP(1)).toBe('1.000');
    expect(formatDf(17)).toBe('17');
    expect(formatDf(152.43)).toBe('152.4');
    expect(formatShare(0.126)).toBe('13\u00a0%');
    expect(counted(1, 'subject', 'subjects')).toBe('1 subject');
    expect(counted(12000, 'subject', 'subjects')).toBe('12\u2009000 subjects');
  });
});

describe('dates', () => {
  it('keeps partial days partial and takes no clock', () => {
    expect(formatDay('2027-03-01')).toBe('1 Mar 2027');
    expect(formatDay('2027-03')).toBe('Mar 2027');
    expect(formatDay('2027')).toBe('2027');
    expect(formatDay(null)).toBe('\u2014');
  });

  it('prints the zone, so that the repeated hour of autumn is two hours', () => {
    expect(formatMoment('2026-10-25T00:30:00Z', 'Europe/London')).toBe('25 Oct 2026, 01:30 BST');
    expect(formatMoment('2026-10-25T01:30:00Z', 'Europe/London')).toBe('25 Oct 2026, 01:30 GMT');
    expect(formatMoment('2027-03-01T14:05:00Z', 'UTC')).toBe('1 Mar 2027, 14:05 UTC');
    expect(formatMoment('nonsense', 'UTC')).toBe('\u2014');
  });

  it('finds the day of a moment in a zone', () => {
    expect(dayOf('2026-12-31T23:30:00Z', 'Europe/Zurich')).toBe('2027-01-01');
  });
});

describe('tables', () => {
  it('makes text harmless that a spreadsheet would run, and leaves numbers alone', () => {
    expect(toCsv([['=1+1', '+x', '-y', '@z', -0.5, 'a,"b"', null]])).toBe(
      `'=1+1,'+x,'-y,'@z,-0.5,"a,""b""",\r\n`,
    );
  });

  it('sorts figures in words as numbers and nothing last', () => {
    expect(['AL10', 'AL9', null, 'AL100'].sort(compareCells)).toEqual([
      'AL9',
      'AL10',
      'AL100',
      null,
    ]);
    expect([10, 9, -1].sort(compareCells)).toEqual([-1, 9, 10]);
  });
});
