import { describe, expect, test } from 'vitest';
import {
  analyseReference,
  analyseRows,
  pooledOf,
  present,
  type Result,
  type Row,
} from './support/engine.ts';
import { referenceAnalysis } from './support/reference.ts';

// Numbers from outside, each with where it stands. "Computed" ones were made in R 4.2.2 by other hands
// than tests/reference and are given to the digits shown. The check is to half a unit of the last digit.

const near = (got: number | null | undefined, want: string): void => {
  const decimals = want.split('.')[1]?.length ?? 0;
  expect(present(got, want)).toBeGreaterThanOrEqual(Number(want) - 0.50001 * 10 ** -decimals);
  expect(present(got, want)).toBeLessThanOrEqual(Number(want) + 0.50001 * 10 ** -decimals);
};

const olsOf = (result: Result, name: string) =>
  present(present(result.ols, 'ols').coefficients[name], name);
const run = (folder: string, name: string): Result =>
  analyseReference(folder, referenceAnalysis(folder, name));

describe('sleepstudy', () => {
  test('published random-slope errors are the cluster-robust ones of the balanced table', () => {
    // Bates, Maechler, Bolker & Walker 2015, J. Stat. Softw. 67(1): 251.405 (6.825), 10.467 (1.546).
    const result = run('sleepstudy', 'full');
    near(pooledOf(result, 'intercept').estimate, '251.405');
    near(pooledOf(result, 'intercept').se_cr2, '6.825');
    near(pooledOf(result, 'time').estimate, '10.467');
    near(pooledOf(result, 'time').se_cr2, '1.546');
  });

  test('amount of dependence (computed)', () => {
    const result = run('sleepstudy', 'full');
    near(olsOf(result, 'intercept').se, '6.610');
    near(olsOf(result, 'time').se, '1.238');
    const i = present(result.independence, 'independence');
    near(i.anova?.msb, '14742.24');
    near(i.anova?.msw, '954.53');
    near(i.icc_residual?.estimate, '0.5909');
    near(i.design_effect, '6.318');
    near(i.effective_n, '28.5');
    near(i.lr_test?.lr, '107.199');
  });

  test('unbalanced subset (computed)', () => {
    const slope = pooledOf(run('sleepstudy', 'unbalanced'), 'time');
    near(slope.estimate, '10.001813');
    near(slope.se_cr0, '1.66985');
    near(slope.se_cr1, '1.71827');
    near(slope.se_cr1s, '1.72391');
    near(slope.se_cr2, '1.72930');
    near(slope.df, '15.5549');
    near(slope.se_cr3, '1.79098');
  });

  test('wild bootstrap, exact (computed)', () => {
    const eight = run('sleepstudy', 'first eight').pooled?.wild_bootstrap?.time;
    near(eight?.t, '3.902254');
    expect(eight?.p).toBe(2 / 256);
    near(eight?.lower, '3.79492');
    near(eight?.upper, '14.38663');
    const six = run('sleepstudy', 'six');
    near(six.pooled?.wild_bootstrap?.time?.t, '2.125934');
    expect(six.pooled?.wild_bootstrap?.time?.p).toBe(6 / 64);
    near(six.pooled?.wild_bootstrap?.time?.lower, '-2.88103');
    near(six.pooled?.wild_bootstrap?.time?.upper, '12.25314');
    near(pooledOf(six, 'time').se_cr2, '2.04011');
    near(pooledOf(six, 'time').df, '5.0');
    near(pooledOf(six, 'time').p, '0.08685');
  });
});

test('twelve readings by hand (our own table, computed)', () => {
  const result = run('hand-sized', 'twelve readings');
  const slope = pooledOf(result, 'time');
  near(pooledOf(result, 'intercept').estimate, '10.6967742');
  near(slope.estimate, '1.6258065');
  near(olsOf(result, 'intercept').se, '1.5126879');
  near(olsOf(result, 'time').se, '0.8614679');
  near(slope.se_cr0, '0.3908918');
  near(slope.se_cr1, '0.4370304');
  near(slope.se_cr1s, '0.4583613');
  near(slope.se_cr2, '0.4963913');
  near(slope.df, '2.828165');
  near(slope.p, '0.0507016');
  near(slope.se_cr3, '0.629413');
  near(result.independence?.anova?.n0, '2.2916667');
  near(result.independence?.icc_residual?.estimate, '0.9643774');
  near(result.pooled?.wild_bootstrap?.time?.t, '3.720122');
  const wild = present(result.pooled?.wild_bootstrap?.time, 'wild_bootstrap');
  expect(wild.p).toBe(2 / 32);
  // With five subjects no enumerated p falls below 2/32, so no value can be ruled out at .05.
  expect(wild.lower).toBeNull();
  expect(wild.upper).toBeNull();
});

test("Petersen's test data", () => {
  // Published on the author's page: .0297, 1.0348; slope errors OLS .0286, by firm .0506, by year .0334.
  // His clustered errors carry the factor G(N-1)/((G-1)(N-p)).
  const firm = run('petersen', 'by firm');
  near(pooledOf(firm, 'intercept').estimate, '0.0297');
  near(pooledOf(firm, 'time').estimate, '1.0348');
  near(olsOf(firm, 'time').se, '0.0286');
  near(pooledOf(firm, 'time').se_cr1s, '0.0506');
  // Computed.
  near(pooledOf(firm, 'time').se_cr1s, '0.050595726');
  near(pooledOf(firm, 'time').se_cr2, '0.0506778');
  near(pooledOf(firm, 'time').df, '308.76');
  const year = run('petersen', 'by year');
  near(pooledOf(year, 'time').se_cr1s, '0.0334');
  near(pooledOf(year, 'time').se_cr1s, '0.033388913');
  near(pooledOf(year, 'time').se_cr2, '0.0333961');
  near(pooledOf(year, 'time').df, '8.989');
});

test('Orthodont: the ordinary error of a within-subject slope is too large', () => {
  // Computed: slope error of age OLS .1092, CR2 .0713; with sex the interaction has CR2 .12125,
  // df 21.65, p .0199, where the ordinary fit claims p .126. The reference level is Female.
  const alone = run('orthodont', 'without group');
  near(olsOf(alone, 'time').se, '0.1092');
  near(pooledOf(alone, 'time').se_cr2, '0.0713');
  expect(present(alone.independence?.se_ratio?.time, 'se_ratio')).toBeLessThan(1);
  const sex = run('orthodont', 'by sex');
  expect(sex.group_levels).toEqual(['Female', 'Male']);
  near(pooledOf(sex, 'time').estimate, '0.4795');
  near(pooledOf(sex, 'time_by_group').estimate, '0.3048');
  near(pooledOf(sex, 'time_by_group').se_cr2, '0.12125');
  near(pooledOf(sex, 'time_by_group').df, '21.65');
  near(pooledOf(sex, 'time_by_group').p, '0.0199');
  near(olsOf(sex, 'time_by_group').p, '0.126');
});

test('Orthodont: the published ANOVA within subjects', () => {
  // Potthoff & Roy's data, published table: age 235.3560 on 1 df, age x subject 71.28148 on 26 df.
  // With four equal ages per subject (Sxx = 20) these are sums over the subjects' own slopes.
  const own = present(run('orthodont', 'without group').per_subject, 'per_subject');
  const mean = present(own.mean_slope, 'mean_slope');
  near(27 * 20 * mean ** 2, '235.3560');
  near(20 * own.lines.reduce((sum, line) => sum + (line.slope - mean) ** 2, 0), '71.28148');
});

test('Shrout & Fleiss 1979, ICC(1,1)', () => {
  // Psychol. Bull. 86:420-428, table 2 (ratings from memory): BMS 11.24, WMS 6.26, ICC(1,1) .17;
  // to three places .166; F 1.795 on 5 and 18 df, interval -.133 to .723.
  const ratings = [
    [9, 2, 5, 8],
    [6, 1, 3, 2],
    [8, 4, 6, 8],
    [7, 1, 2, 6],
    [10, 5, 6, 9],
    [6, 2, 4, 7],
  ];
  const rows: Row[] = ratings.flatMap((r, i) => r.map((y, j): Row => [`s${i + 1}`, j + 1, y]));
  const i = present(analyseRows(rows, { draws: 199 }).independence, 'independence');
  near(i.icc_response?.estimate, '0.166');
  near(i.icc_response?.lower, '-0.133');
  near(i.icc_response?.upper, '0.723');
  // F follows from the ICC: F = 1 + 4 ICC/(1 - ICC).
  const icc = present(i.icc_response, 'icc_response').estimate;
  near(1 + (4 * icc) / (1 - icc), '1.795');
});
