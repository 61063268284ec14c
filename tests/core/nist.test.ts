import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { covariateDesign } from '../../core/linear/design.ts';
import { coefficientDirections, fitOls, ordinaryError } from '../../core/linear/fit-ols.ts';
import { analyseRows, pooledOf, present, type Row } from './support/engine.ts';
import { referencePath } from './support/reference.ts';

// NIST/ITL Statistical Reference Datasets. The files in tests/reference/nist hold the certified values.

const text = (name: string): string => readFileSync(referencePath('nist', `${name}.dat`), 'utf8');

/** The rows of a file's data part, which starts after the last line that begins with "Data:". */
function dataRows(file: string): [number, number][] {
  const lines = file.split('\n');
  const from = lines.map((line) => line.startsWith('Data:')).lastIndexOf(true) + 1;
  return lines
    .slice(from)
    .filter((line) => line.trim() !== '')
    .map((line) => line.trim().split(/\s+/).map(Number) as [number, number]);
}

const digits = (got: number, certified: number): number =>
  got === certified ? 15 : -Math.log10(Math.abs(got - certified) / Math.abs(certified));

test('Norris: one reading per subject makes the pooled line a plain regression', () => {
  const rows = dataRows(text('Norris')).map(([y, x], i): Row => [`r${i}`, x, y]);
  expect(rows).toHaveLength(36);
  const result = analyseRows(rows);
  expect(result.independence?.verdict).toBe('no_repeats');
  expect(result.ols_locked).toBeNull();
  const ols = present(result.ols, 'ols');
  const certified: [number, number][] = [
    [ols.coefficients.intercept!.estimate, -0.262323073774029],
    [ols.coefficients.intercept!.se, 0.232818234301152],
    [ols.coefficients.time!.estimate, 1.00211681802045],
    [ols.coefficients.time!.se, 0.429796848199937e-3],
    [ols.sigma, 0.884796396144373],
    [present(ols.r_squared, 'r_squared'), 0.999993745883712],
  ];
  for (const [got, want] of certified) expect(digits(got, want)).toBeGreaterThan(11);
});

test('Longley: six nearly collinear columns keep nine digits', () => {
  // J. Am. Stat. Assoc. 62:819-841 (1967): y, then GNP deflator, GNP, unemployed, armed forces,
  // population, year; certified by NIST.
  const table = [
    [60323, 83.0, 234289, 2356, 1590, 107608, 1947],
    [61122, 88.5, 259426, 2325, 1456, 108632, 1948],
    [60171, 88.2, 258054, 3682, 1616, 109773, 1949],
    [61187, 89.5, 284599, 3351, 1650, 110929, 1950],
    [63221, 96.2, 328975, 2099, 3099, 112075, 1951],
    [63639, 98.1, 346999, 1932, 3594, 113270, 1952],
    [64989, 99.0, 365385, 1870, 3547, 115094, 1953],
    [63761, 100.0, 363112, 3578, 3350, 116219, 1954],
    [66019, 101.2, 397469, 2904, 3048, 117388, 1955],
    [67857, 104.6, 419180, 2822, 2857, 118734, 1956],
    [68169, 108.4, 442769, 2936, 2798, 120445, 1957],
    [66513, 110.8, 444546, 4681, 2637, 121950, 1958],
    [68655, 112.6, 482704, 3813, 2552, 123366, 1959],
    [69564, 114.2, 502601, 3931, 2514, 125368, 1960],
    [69331, 115.7, 518173, 4806, 2572, 127852, 1961],
    [70551, 116.9, 554894, 4007, 2827, 130081, 1962],
  ];
  const column = (k: number): Float64Array => Float64Array.from(table, (row) => row[k]!);
  const names = ['deflator', 'gnp', 'unemployed', 'forces', 'population', 'year'];
  const design = covariateDesign(names.map((name, k) => ({ name, x: column(k + 1) })));
  const fit = fitOls(design, column(0));
  const errors = coefficientDirections(fit).map((h) => ordinaryError(fit, h));
  const certified = [
    [-3482258.63459582, 890420.383607373],
    [15.0618722713733, 84.9149257747669],
    [-0.035819179292591, 0.0334910077722432],
    [-2.02022980381683, 0.488399681651699],
    [-1.03322686717359, 0.214274163161675],
    [-0.0511041056535807, 0.22607320006937],
    [1829.15146461355, 455.478499142212],
  ];
  certified.forEach(([estimate, error], k) => {
    expect(digits(fit.beta[k]!, estimate!)).toBeGreaterThan(9);
    expect(digits(errors[k]!, error!)).toBeGreaterThan(9);
  });
  expect(digits(Math.sqrt(fit.sigmaSquared), 304.854073561965)).toBeGreaterThan(10);
});

describe('one-way analysis of variance', () => {
  // name, digits that doubles allow after that many constant leading digits in the data.
  test.each([
    ['SiRstv', 10],
    ['AtmWtAg', 7],
    ['SmLs01', 11],
    ['SmLs04', 7],
    ['SmLs07', 2],
    ['SmLs09', 2],
  ] as const)('%s', (name, atLeast) => {
    const file = text(name);
    const certified = Number(/Between.*\s(\S+)\s*$/m.exec(file)?.[1]);
    const rows = dataRows(file);
    const table = withReplicates(rows);
    const treatments = new Set(rows.map(([treatment]) => treatment)).size;
    const result = analyseRows(table, { only: ['check'], draws: 19 });
    const independence = present(result.independence, 'independence');
    // The response's own ICC is a function of its F alone where every subject has m readings:
    // ICC = (F - 1)/(F - 1 + m).
    const m = rows.length / treatments;
    const icc = present(independence.icc_response, 'icc_response').estimate;
    const f = 1 + (m * icc) / (1 - icc);
    expect(digits(f, certified)).toBeGreaterThan(atLeast);
  });

  test('the anova block of the residuals', () => {
    // Every treatment has the same times, so taking the line off leaves the differences of the
    // treatments' means as they were: MSB of the residuals is the certified one of the readings, and
    // the certified MSW is theirs plus what the slope explains.
    const rows = dataRows(text('SmLs01'));
    const table = withReplicates(rows);
    const result = analyseRows(table, { only: ['check', 'cr'], draws: 19 });
    const anova = present(result.independence?.anova, 'anova');
    expect(digits(anova.msb, 1.68 / 8)).toBeGreaterThan(10);
    expect(anova.n0).toBe(21);
    const slope = pooledOf(result, 'time').estimate;
    const sxx = (9 * (21 * (21 ** 2 - 1))) / 12;
    expect(digits(anova.msw + (slope ** 2 * sxx) / 180, 0.01)).toBeGreaterThan(10);
  });
});

/** Treatments as subjects, the running number within treatment as time. */
function withReplicates(rows: readonly [number, number][]): Row[] {
  const seen = new Map<number, number>();
  return rows.map(([treatment, y]): Row => {
    const replicate = (seen.get(treatment) ?? 0) + 1;
    seen.set(treatment, replicate);
    return [`t${treatment}`, replicate, y];
  });
}
