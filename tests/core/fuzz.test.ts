import fc from 'fast-check';
import { expect, test } from 'vitest';
import { dealtTwin, pooledBand, residualsOf, StatsError } from '../../core/index.ts';
import { analyseRows, type Result, type Row, tableOf } from './support/engine.ts';
import { holes } from './support/no-holes.ts';

// Any table at all is either refused with a typed error or answered without a hole. The generators lean
// towards what goes wrong: few subjects, few distinct times and values, replicates, huge and tiny
// numbers, missing cells, groups that hang on one subject.

const value = fc.oneof(
  { weight: 6, arbitrary: fc.integer({ min: -3, max: 3 }) },
  { weight: 3, arbitrary: fc.double({ min: -1e3, max: 1e3, noNaN: true }) },
  {
    weight: 1,
    arbitrary: fc.constantFrom(Number.NaN, 0, -0, 1e-300, 1e-12, 1e12, 1e99, -1e99, 5e-324),
  },
);
const time = fc.oneof(
  { weight: 8, arbitrary: fc.integer({ min: 0, max: 4 }) },
  { weight: 2, arbitrary: fc.double({ min: -10, max: 1e4, noNaN: true }) },
  { weight: 1, arbitrary: fc.constantFrom(Number.NaN, 1e-9, 1e15, -1e50, 2.5) },
);
const code = fc.constantFrom('a', 'b', 'c', 'd', 'e', '');
const readings = fc.array(fc.tuple(code, time, value), { maxLength: 24 });
const subjectLevels = fc.record({
  a: fc.constantFrom('x', 'y', 'z'),
  b: fc.constantFrom('x', 'y'),
  c: fc.constantFrom('x', 'y', ''),
  d: fc.constantFrom('y', 'z'),
  e: fc.constant('x'),
});

function outcome(rows: readonly Row[]): Result | StatsError {
  try {
    return analyseRows(rows, { draws: 49, acknowledge: 'any table at all' });
  } catch (error) {
    if (error instanceof StatsError) return error;
    throw error;
  }
}

/** What is true of every answer, whatever the table. */
function check(rows: readonly Row[]): void {
  const result = outcome(rows);
  if (result instanceof StatsError) {
    expect(result.code).toMatch(/^[a-z_]+$/);
    return;
  }
  expect(holes(result)).toEqual([]);
  expect(JSON.parse(JSON.stringify(result))).toEqual(JSON.parse(JSON.stringify(result)));
  const { structure, independence, pooled, per_subject } = result;
  expect(result.input.used + result.input.dropped.length).toBe(rows.length);
  expect(independence?.warn).toBe(structure.subjects_with_repeats > 0);
  expect(independence?.verdict === 'no_repeats').toBe(structure.subjects_with_repeats === 0);
  const own = per_subject;
  expect((own?.lines.length ?? 0) + (own?.not_fitted.length ?? 0)).toBe(structure.subjects);
  const icc = independence?.icc_residual;
  if (icc) {
    expect(icc.lower).toBeLessThanOrEqual(icc.estimate);
    expect(icc.upper).toBeGreaterThanOrEqual(icc.estimate);
    expect(icc.upper).toBeLessThanOrEqual(1);
  }
  for (const p of [independence?.lr_test?.p, independence?.permutation?.p]) {
    if (p !== undefined) expect(p >= 0 && p <= 1).toBe(true);
  }
  for (const c of Object.values(pooled?.coefficients ?? {})) {
    for (const se of [c.se_cr0, c.se_cr1, c.se_cr1s, c.se_cr2, c.se_cr3]) {
      if (se !== null) expect(se).toBeGreaterThanOrEqual(0);
    }
    if (c.p !== null) expect(c.p >= 0 && c.p <= 1).toBe(true);
    if (c.df !== null) expect(c.df).toBeGreaterThan(0);
    if (c.lower !== null) expect(c.lower).toBeLessThanOrEqual(c.estimate);
    if (c.upper !== null) expect(c.upper).toBeGreaterThanOrEqual(c.estimate);
  }
  const table = tableOf(rows);
  expect(
    holes(pooledBand(table, [0, 1.5, 1e4]).map(({ time: t, estimate }) => [t, estimate])),
  ).toEqual([]);
  expect(holes(residualsOf(table))).toEqual([]);
  expect(holes(dealtTwin(table, 2))).toEqual([]);
}

test('any table without groups', () => {
  fc.assert(
    fc.property(readings, (list) => check(list)),
    { numRuns: 1500, seed: 20261201 },
  );
});

test('any table with groups', () => {
  fc.assert(
    fc.property(readings, subjectLevels, (list, level) =>
      check(list.map(([s, t, y]): Row => [s, t, y, level[s as keyof typeof level] ?? 'x'])),
    ),
    { numRuns: 1000, seed: 20261201 },
  );
});
