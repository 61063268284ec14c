import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { chiSquaredQuantile, chiSquaredUpper } from '../../core/distributions/chi-squared.ts';
import { fQuantile, fUpper } from '../../core/distributions/f.ts';
import { normalLower, normalQuantile, normalUpper } from '../../core/distributions/normal.ts';
import {
  studentQuantile,
  studentTwoSided,
  studentUpper,
} from '../../core/distributions/student-t.ts';

// Rows are the arguments followed by R's value (tests/reference/distributions/generate.R).
const tables = JSON.parse(
  readFileSync(new URL('../reference/distributions/expected.json', import.meta.url), 'utf8'),
) as Record<string, number[][]>;

const functions: Record<string, (...args: number[]) => number> = {
  normalLower: (z) => normalLower(z!),
  normalUpper: (z) => normalUpper(z!),
  normalQuantile: (p) => normalQuantile(p!),
  studentTwoSided: (t, df) => studentTwoSided(t!, df!),
  studentUpper: (t, df) => studentUpper(t!, df!),
  studentQuantile: (p, df) => studentQuantile(p!, df!),
  chiSquaredUpper: (x, df) => chiSquaredUpper(x!, df!),
  chiSquaredQuantile: (p, df) => chiSquaredQuantile(p!, df!),
  fUpper: (x, d1, d2) => fUpper(x!, d1!, d2!),
  fQuantile: (p, d1, d2) => fQuantile(p!, d1!, d2!),
};

describe('distribution functions against R', () => {
  test('every table of R has its function and none is empty', () => {
    expect(Object.keys(tables).sort()).toEqual(Object.keys(functions).sort());
    for (const rows of Object.values(tables)) expect(rows.length).toBeGreaterThan(20);
  });

  test.each(Object.keys(functions))('%s agrees to 1e-10 relative over the grid', (name) => {
    const off = tables[name]!.flatMap((row) => {
      const args = row.slice(0, -1);
      const want = row.at(-1)!;
      const got = functions[name]!(...args);
      // A median of a symmetric law is 0 exactly; there alone the distance is absolute.
      const scale = Math.abs(want) < 1e-15 ? 1 : Math.abs(want);
      const error = Math.abs(got - want) / scale;
      return error <= 1e-10 ? [] : [`${name}(${args.join(', ')}) = ${got}, R ${want}`];
    });
    expect(off).toEqual([]);
  });

  test('tails add up to one where both are ordinary numbers', () => {
    for (const z of [-2, -0.5, 0, 0.5, 2]) {
      expect(normalLower(z) + normalUpper(z)).toBeCloseTo(1, 14);
      expect(studentUpper(z, 7) + studentUpper(-z, 7)).toBeCloseTo(1, 14);
    }
  });
});
