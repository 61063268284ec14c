import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import {
  analyseRows,
  type Options,
  pooledOf,
  present,
  type Result,
  type Row,
} from './support/engine.ts';
import { holes } from './support/no-holes.ts';

// Random small tables: 3 to 7 subjects with 1 to 5 readings at distinct times of a coarse grid, and
// responses on a grid of eighths, so that no shift or scale below costs a digit.
const RUNS = { numRuns: 60, seed: 20261201 };
const OPTIONS: Options = { draws: 99, seed: 5, acknowledge: 'a property of the algebra' };

const subject = fc.uniqueArray(
  fc.tuple(fc.integer({ min: 0, max: 11 }), fc.integer({ min: -400, max: 400 })),
  {
    minLength: 1,
    maxLength: 5,
    selector: ([t]) => t,
  },
);

const tables: fc.Arbitrary<Row[]> = fc
  .array(subject, { minLength: 3, maxLength: 7 })
  .map((subjects) =>
    subjects.flatMap((readings, i) => readings.map(([t, y]): Row => [`s${i}`, t / 2, y / 8])),
  )
  .filter((rows) => rows.length >= 6 && new Set(rows.map((r) => r[1])).size >= 3)
  .filter((rows) => new Set(rows.map((r) => r[0])).size < rows.length)
  // A subject that alone holds a direction makes numbers null: edges.test.ts looks at those.
  .filter((rows) => spreadOf(rows) > 0.05);

/** Share of the residual sum of squares: tables that lie on a line belong to the edge cases. */
function spreadOf(rows: readonly Row[]): number {
  const [mt, my] = [mean(rows.map((r) => r[1])), mean(rows.map((r) => r[2]))];
  let [xx, xy, yy] = [0, 0, 0];
  for (const [, t, y] of rows) {
    xx += (t - mt) ** 2;
    xy += (t - mt) * (y - my);
    yy += (y - my) ** 2;
  }
  return yy === 0 ? 0 : 1 - (xy * xy) / (xx * yy);
}

const mean = (v: readonly number[]): number => v.reduce((sum, x) => sum + x, 0) / v.length;
const analyse = (rows: readonly Row[]): Result => analyseRows(rows, OPTIONS);

/** Everything that no random draw enters, by name; texts left out. */
function exactPart(result: Result): Record<string, unknown> {
  const i = present(result.independence, 'independence');
  return {
    structure: result.structure,
    ols: result.ols?.coefficients,
    pooled: result.pooled?.coefficients,
    icc_residual: i.icc_residual,
    icc_response: i.icc_response,
    anova: i.anova,
    design_effect: i.design_effect,
    variogram: i.variogram,
    lag1: i.serial?.lag1,
    lag1_expected: i.serial?.lag1_expected,
    se_ratio: i.se_ratio,
    moulton: i.moulton,
    mean_slope: result.per_subject?.mean_slope,
    sd_slope: result.per_subject?.sd_slope,
  };
}

/** `differences` for numbers that may cross zero: those below `floor` of the response's size count as 0. */
function close(got: unknown, want: unknown, relative: number, floor = 1e-9): string[] {
  const rounded = (value: unknown): unknown => {
    if (typeof value === 'number') return Math.abs(value) < floor ? 0 : value;
    if (Array.isArray(value)) return value.map(rounded);
    if (typeof value !== 'object' || value === null) return value;
    return Object.fromEntries(Object.entries(value).map(([k, v]) => [k, rounded(v)]));
  };
  return differences(rounded(got), rounded(want), relative);
}

describe('what no rewriting of a table may change', () => {
  test('renaming subjects changes names only', () => {
    fc.assert(
      fc.property(tables, (rows) => {
        const renamed = rows.map(([s, t, y]): Row => [`Z-${s}-renamed`, t, y]);
        const text = JSON.stringify(analyse(renamed)).replaceAll(/Z-(s\d)-renamed/g, '$1');
        expect(text).toBe(JSON.stringify(analyse(rows)));
      }),
      RUNS,
    );
  });

  test('the order of the rows does not matter to what is not drawn at random', () => {
    const shuffled = tables.chain((rows) =>
      fc.tuple(
        fc.constant(rows),
        fc.shuffledSubarray(rows, { minLength: rows.length, maxLength: rows.length }),
      ),
    );
    fc.assert(
      fc.property(shuffled, ([rows, other]) => {
        const [a, b] = [analyse(rows), analyse(other)];
        expect(close(exactPart(b), exactPart(a), 1e-7)).toEqual([]);
        expect(b.independence?.verdict).toBe(a.independence?.verdict);
        expect(close(b.independence?.lr_test, a.independence?.lr_test, 1e-4, 1e-5)).toEqual([]);
        const bySubject = (r: Result) =>
          [...present(r.per_subject, 'lines').lines].sort((x, y) =>
            x.subject < y.subject ? -1 : 1,
          );
        expect(close(bySubject(b), bySubject(a), 1e-8)).toEqual([]);
        // Up to seven subjects and 99 draws: six or fewer are enumerated, where order cannot matter.
        if (a.structure.subjects <= 6) {
          expect(b.pooled?.wild_bootstrap?.time?.p).toBe(a.pooled?.wild_bootstrap?.time?.p);
        }
      }),
      RUNS,
    );
  });

  test('the same table, seed and draws give the same bytes; no answer has a hole', () => {
    fc.assert(
      fc.property(tables, (rows) => {
        const result = analyse(rows);
        expect(holes(result)).toEqual([]);
        expect(JSON.stringify(analyse(rows))).toBe(JSON.stringify(result));
      }),
      RUNS,
    );
  });
});

/** The pooled and ordinary table of one coefficient, as it must be after y → a + b y and t → c + d t. */
function moved(
  result: Result,
  a: number,
  b: number,
  c: number,
  d: number,
): Record<string, unknown> {
  const time = pooledOf(result, 'time');
  const scaled = (x: number | null) => (x === null ? null : Math.abs(b / d) * x);
  const slope = (b / d) * time.estimate;
  const flipped = Math.sign(b / d);
  const limits = [time.lower, time.upper].map((x) => (x === null ? null : (b / d) * x));
  if (flipped < 0) limits.reverse();
  return {
    estimate: slope,
    se_cr0: scaled(time.se_cr0),
    se_cr1: scaled(time.se_cr1),
    se_cr1s: scaled(time.se_cr1s),
    se_cr2: scaled(time.se_cr2),
    se_cr3: scaled(time.se_cr3),
    df: time.df,
    t: time.t === null ? null : flipped * time.t,
    p: time.p,
    lower: limits[0],
    upper: limits[1],
    intercept: a + b * pooledOf(result, 'intercept').estimate - slope * c,
  };
}

describe('shifting and scaling', () => {
  const numbers = fc.record({
    a: fc.integer({ min: -1000, max: 1000 }),
    b: fc.constantFrom(-8, -3, -0.5, 0.125, 1, 7),
    c: fc.integer({ min: -3000, max: 3000 }),
    d: fc.constantFrom(-7, -1, 0.25, 1, 365.25),
  });

  test('of time and response move the line and its errors as algebra says', () => {
    fc.assert(
      fc.property(tables, numbers, (rows, { a, b, c, d }) => {
        const before = analyse(rows);
        const after = analyse(rows.map(([s, t, y]): Row => [s, c + d * t, a + b * y]));
        const got = {
          ...pooledOf(after, 'time'),
          intercept: pooledOf(after, 'intercept').estimate,
        };
        // The new intercept may be small beside the numbers it is made of.
        const size = 1 + Math.abs(a) + Math.abs(c * got.estimate);
        expect(close(got, moved(before, a, b, c, d), 1e-7, 1e-11 * size)).toEqual([]);
      }),
      RUNS,
    );
  });

  test('leave correlations as they are and take variances along', () => {
    fc.assert(
      fc.property(tables, numbers, (rows, { a, b, c, d }) => {
        const before = present(analyse(rows).independence, 'independence');
        const after = present(
          analyse(rows.map(([s, t, y]): Row => [s, c + d * t, a + b * y])).independence,
          'independence',
        );
        const times = (x: number | undefined) => (x === undefined ? x : x * b * b);
        const want = {
          icc_residual: before.icc_residual,
          icc_response: before.icc_response,
          anova: {
            msb: times(before.anova?.msb),
            msw: times(before.anova?.msw),
            n0: before.anova?.n0,
          },
          design_effect: before.design_effect,
          effective_n: before.effective_n,
          lag1: before.serial?.lag1,
          lag1_expected: before.serial?.lag1_expected,
          time_ratio: before.se_ratio?.time,
          time_moulton: before.moulton?.time,
          variogram: before.variogram?.bins.map((bin) => ({
            lag: bin.lag * Math.abs(d),
            value: times(bin.value),
            pairs: bin.pairs,
          })),
          total: times(before.variogram?.total ?? undefined),
          verdict: before.verdict,
        };
        const got = {
          ...after,
          lag1: after.serial?.lag1,
          lag1_expected: after.serial?.lag1_expected,
          time_ratio: after.se_ratio?.time,
          time_moulton: after.moulton?.time,
          variogram: after.variogram?.bins,
          total: after.variogram?.total,
        };
        expect(close(got, want, 1e-7, 1e-11)).toEqual([]);
        expect(close(after.lr_test?.lr, before.lr_test?.lr, 1e-4, 1e-5)).toEqual([]);
      }),
      RUNS,
    );
  });

  test('leave the enumerated bootstrap p as it is and turn its limits along', () => {
    const six = tables.filter((rows) => new Set(rows.map((r) => r[0])).size <= 6);
    fc.assert(
      fc.property(six, numbers, (rows, { a, b, c, d }) => {
        const before = analyse(rows).pooled?.wild_bootstrap?.time;
        const after = analyse(rows.map(([s, t, y]): Row => [s, c + d * t, a + b * y])).pooled
          ?.wild_bootstrap?.time;
        expect(after?.p).toBe(before?.p);
        const limits = [before?.lower, before?.upper].map((x) =>
          typeof x === 'number' ? (x * b) / d : x,
        );
        if (b / d < 0) limits.reverse();
        expect(close([after?.lower, after?.upper], limits, 1e-6, 1e-7)).toEqual([]);
      }),
      RUNS,
    );
  });
});
