import { describe, expect, test } from 'vitest';
import { StatsError } from '../../core/errors.ts';
import { differences } from './support/differences.ts';
import {
  analyseReference,
  analyseRows,
  type Options,
  pooledOf,
  present,
  type Result,
  type Row,
} from './support/engine.ts';
import { holes } from './support/no-holes.ts';
import { referenceAnalysis } from './support/reference.ts';

// Tables at the edge: refused with a typed error, or answered with nulls that say why.

const OPTIONS: Options = { draws: 99, acknowledge: 'an edge case of the engine' };

function answer(rows: readonly Row[]): Result {
  const result = analyseRows(rows, OPTIONS);
  expect(holes(result)).toEqual([]);
  return result;
}

function refusal(rows: readonly Row[]): StatsError {
  try {
    analyseRows(rows, OPTIONS);
  } catch (error) {
    if (error instanceof StatsError) return error;
    throw error;
  }
  throw new Error('the engine answered');
}

/** Subjects a, b, c … with the given readings [time, response]. */
const subjects = (...readings: [number, number][][]): Row[] =>
  readings.flatMap((own, i) => own.map(([t, y]): Row => [String.fromCharCode(97 + i), t, y]));

const ordinary = (): Row[] =>
  subjects(
    [
      [0, 10],
      [1, 12],
      [2, 13],
    ],
    [
      [0, 8],
      [2, 11],
    ],
    [
      [0, 15],
      [1, 15],
      [2, 17],
      [3, 20],
    ],
    [
      [1, 9],
      [3, 12],
    ],
    [[2, 14]],
  );

const reasonOf = (block: unknown, name: string): string => {
  const reason = (block as Record<string, unknown>)[`${name}_reason`];
  if (typeof reason !== 'string') throw new Error(`${name} has no reason`);
  return reason;
};

describe('refused, with the code that says what to mend', () => {
  const with_ = (change: (rows: Row[]) => Row[]) => change(ordinary());
  test.each<[string, Row[], string]>([
    ['no row at all', [], 'no_usable_rows'],
    [
      'every response missing',
      with_((r) => r.map(([s, t]): Row => [s, t, Number.NaN])),
      'no_usable_rows',
    ],
    [
      'every time missing',
      with_((r) => r.map(([s, , y]): Row => [s, Number.NaN, y])),
      'no_usable_rows',
    ],
    ['every subject missing', with_((r) => r.map(([, t, y]): Row => ['', t, y])), 'no_usable_rows'],
    [
      'one subject',
      subjects([
        [0, 1],
        [1, 3],
        [2, 2],
        [3, 5],
      ]),
      'too_few_subjects',
    ],
    [
      'one subject left after missing readings',
      [
        ...subjects([
          [0, 1],
          [1, 3],
          [2, 2],
        ]),
        ['z', 1, Number.NaN],
      ],
      'too_few_subjects',
    ],
    ['a constant time', with_((r) => r.map(([s, , y]): Row => [s, 4, y])), 'too_few_times'],
    ['as many readings as parameters', subjects([[0, 1]], [[1, 3]]), 'too_few_readings'],
    [
      'an infinite response',
      with_((r) => [...r, ['e', 3, Number.POSITIVE_INFINITY]]),
      'infinite_value',
    ],
    [
      'an infinite time',
      with_((r) => [...r, ['e', Number.NEGATIVE_INFINITY, 3]]),
      'infinite_value',
    ],
    ['1e308', with_((r) => [...r, ['e', 3, 1e308]]), 'out_of_scale'],
    ['-1e308 as a time', with_((r) => [...r, ['e', -1e308, 3]]), 'out_of_scale'],
    [
      'a subject with two levels',
      with_((r) => r.map(([s, t, y], i): Row => [s, t, y, i % 2 ? 'x' : 'y'])),
      'two_levels',
    ],
    [
      'a group with one level',
      with_((r) => r.map(([s, t, y]): Row => [s, t, y, 'x'])),
      'one_level',
    ],
    [
      'a group whose only subject has one reading',
      with_((r) => r.map(([s, t, y]): Row => [s, t, y, s === 'e' ? 'x' : 'y'])),
      'collinear',
    ],
    [
      'a group at one time only',
      with_((r) =>
        [...r, ['f', 1, 3] as const, ['g', 1, 4] as const].map(
          ([s, t, y]): Row => [s!, t!, y!, s === 'f' || s === 'g' ? 'x' : 'y'],
        ),
      ),
      'collinear',
    ],
  ])('%s', (_, rows, code) => {
    expect(refusal(rows).code).toBe(code);
  });

  test('the refusal names the line: the header is line 1', () => {
    const rows = [...ordinary(), ['e', 3, Number.POSITIVE_INFINITY] as const];
    expect(refusal(rows).parameters).toMatchObject({ column: 'response', line: rows.length + 1 });
  });

  test('a bad seed or number of draws', () => {
    for (const options of [
      { seed: 1.5 },
      { seed: Number.NaN },
      { draws: 0 },
      { draws: -5 },
      { draws: 2.5 },
    ]) {
      expect(() => analyseRows(ordinary(), options)).toThrow(StatsError);
    }
  });
});

describe('missing readings', () => {
  test('are dropped, counted and listed by line; the rest is as without them', () => {
    const whole = answer(ordinary());
    const rows: Row[] = [['', 1, 5], ['a', Number.NaN, 5], ...ordinary(), ['e', 3, Number.NaN]];
    const result = answer(rows);
    expect(result.input).toMatchObject({ rows: rows.length, used: 12 });
    expect(result.input.dropped.map((d) => d.line)).toEqual([2, 3, rows.length + 1]);
    for (const d of result.input.dropped) expect(d.reason.length).toBeGreaterThan(5);
    expect(result.pooled?.coefficients).toEqual(whole.pooled?.coefficients);
    expect(result.independence?.icc_residual).toEqual(whole.independence?.icc_residual);
  });

  test('a missing group drops its row', () => {
    const rows = ordinary().map(
      ([s, t, y], i): Row => [s, t, y, i === 0 ? '' : s < 'c' ? 'x' : 'y'],
    );
    expect(answer(rows).input.dropped).toHaveLength(1);
  });
});

describe('no residual variance', () => {
  const line = ordinary().map(([s, t]): Row => [s, t, 3 + 2 * t]);

  test.each<[string, Row[]]>([
    ['a perfect line', line],
    ['a constant response', ordinary().map(([s, t]): Row => [s, t, 7])],
    ['a response of zeros', ordinary().map(([s, t]): Row => [s, t, 0])],
    ['a perfect line far from zero', line.map(([s, t, y]): Row => [s, t + 1e6, y * 3e5 + 1e9])],
    ['a perfect line in thirds', line.map(([s, t]): Row => [s, t / 3, 1 / 7 + t / 11])],
  ])('%s: the line is given, what divides by the variance is not', (_, rows) => {
    const result = answer(rows);
    const i = present(result.independence, 'independence');
    expect(i.verdict).toBe('repeats_none_detected');
    expect(i.warn).toBe(true);
    expect(i.headline).not.toMatch(/NaN|Infinity|undefined/);
    expect(i.icc_residual).toBeNull();
    expect(reasonOf(i, 'icc_residual')).toMatch(/line/);
    expect(i.lr_test).toBeNull();
    expect(i.permutation).toBeNull();
    expect(i.design_effect).toBeNull();
    const time = pooledOf(result, 'time');
    const [first, last] = [rows[0]!, rows[2]!];
    const slope = (last[2] - first[2]) / (last[1] - first[1]);
    expect(time.estimate).toBeCloseTo(slope, 6);
    expect(time.t).toBeNull();
    expect(time.p).toBeNull();
  });
});

test('identical repeats: ICC is 1 with limits 1, and what divides by MSW says so', () => {
  const level = (y: number, times: number[]): [number, number][] => times.map((t) => [t, y]);
  // Each subject stands at the same times: the pooled slope is 0 exactly and residuals repeat.
  const rows = subjects(
    level(3, [0, 1, 2]),
    level(8, [0, 1, 2]),
    level(4, [0, 1, 2]),
    level(9, [0, 1, 2]),
  );
  const i = present(answer(rows).independence, 'independence');
  expect(i.icc_residual).toMatchObject({ estimate: 1, lower: 1, upper: 1 });
  expect(i.verdict).toBe('exchangeable');
  expect(i.lr_test).toBeNull();
  expect(i.permutation).toBeNull();
  expect(reasonOf(i, 'lr_test')).toMatch(/identical/);
  expect(reasonOf(i, 'permutation')).toMatch(/identical/);
});

test('negative dependence is reported as negative', () => {
  // Two readings of each subject lie on opposite sides of the line by nearly the same amount.
  const rows = subjects(
    ...Array.from({ length: 14 }, (_, k): [number, number][] => {
      const side = (5 + k / 3) * (k % 2 ? 1 : -1);
      return [
        [0, 20 + side],
        [1, 21 - side + (k % 3) / 10],
      ];
    }),
  );
  const i = present(answer(rows).independence, 'independence');
  const icc = present(i.icc_residual, 'icc');
  expect(icc.estimate).toBeLessThan(-0.5);
  expect(present(icc.upper, 'upper')).toBeLessThan(0);
  expect(i.verdict).toBe('negative');
  expect(i.warn).toBe(true);
  expect(i.lr_test).toEqual({ lr: 0, p: 1 });
  // 1 + (2 - 1) ICC is near 0: either positive with more readings in effect than there are, or null.
  if (i.design_effect !== null) expect(present(i.effective_n, 'effective_n')).toBeGreaterThan(28);
});

test('a quiet table: repeats without detected dependence still warn', () => {
  const noise = [4, -1, 2, 0, -3, 1, -2, 3, 1, -4, 0, 2, -1, 3, -2, -3];
  const rows = noise.map((e, k): Row => [`s${k % 8}`, Math.floor(k / 8), 10 + e]);
  const i = present(answer(rows).independence, 'independence');
  expect(i.verdict).toBe('repeats_none_detected');
  expect(i.warn).toBe(true);
});

test('one subject with two readings is enough to warn', () => {
  const rows: Row[] = Array.from({ length: 20 }, (_, k): Row => [`s${k}`, k % 5, (k * 7) % 11]);
  rows.push(['s3', 4, 6]);
  const result = answer(rows);
  expect(result.independence?.warn).toBe(true);
  expect(result.independence?.verdict).not.toBe('no_repeats');
  expect(result.structure.subjects_with_repeats).toBe(1);
});

test('replicates: readings of one subject at one time are kept and counted', () => {
  const rows = [...ordinary(), ['a', 1, 12.5], ['a', 1, 11.5], ['c', 3, 19]] as Row[];
  const result = answer(rows);
  expect(result.structure.replicates).toBe(3);
  expect(result.structure.readings).toBe(15);
  // Pairs at lag 0 stand in the variogram: three of subject a, one of subject c.
  expect(result.independence?.variogram?.bins[0]).toMatchObject({ lag: 0, pairs: 4 });
});

test('only replicates: repeats without a second time', () => {
  const rows = [0, 1, 2, 3, 4, 5].flatMap((k): Row[] => [
    [`s${k}`, k, k * 1.5 + (k % 2)],
    [`s${k}`, k, k * 1.5 - (k % 3)],
  ]);
  const result = answer(rows);
  expect(result.per_subject?.lines).toEqual([]);
  expect(result.per_subject?.not_fitted).toHaveLength(6);
  expect(result.independence?.warn).toBe(true);
});

describe('extreme leverage', () => {
  // Everybody stands at time 0 but one subject, who alone holds the slope.
  const rows: Row[] = [
    ...[3, 5, 4, 6, 2, 7].flatMap((y, k): Row[] => [
      [`s${k}`, 0, y],
      [`s${k}`, 0, y + 1],
    ]),
    ['far', 10, 30],
    ['far', 10, 33],
  ];

  test('a slope that one subject holds gets no headline p and names the subject', () => {
    const result = answer(rows);
    const time = pooledOf(result, 'time');
    expect(time.p).toBeNull();
    expect(time.se_cr3).toBeNull();
    expect(reasonOf(time, 'p')).toContain('far');
  });

  // H_ii of that subject has an eigenvalue of 1 - 2e-3 … 1 - 2e-9: tests/reference/leverage. Towards the
  // end R's own (I - H)^(-1/2) of an N x N matrix keeps fewer digits than the short form.
  test.each([
    ['step 1', 1e-8],
    ['step 0.1', 1e-7],
    ['step 0.01', 1e-5],
    ['step 0.001', 1e-3],
  ])('nearly so, %s: errors and df as clubSandwich gives them', (name, tolerance) => {
    const reference = referenceAnalysis('leverage', name);
    const result = analyseReference('leverage', reference, { only: ['cr'] });
    const time = pooledOf(result, 'time');
    const { estimate, se_cr0, se_cr1, se_cr2, se_cr3, df } = reference.pooled.coefficients.time!;
    expect(differences(time, { estimate, se_cr0, se_cr1, se_cr2, se_cr3, df }, tolerance)).toEqual(
      [],
    );
  });
});

test('numbers of very different size keep their digits', () => {
  const small = answer(ordinary());
  const large = answer(ordinary().map(([s, t, y]): Row => [s, t * 1e-6 + 2026, y * 1e9 - 4e12]));
  const [a, b] = [small, large].map((r) => pooledOf(r, 'time'));
  expect(b!.estimate / (a!.estimate * 1e15)).toBeCloseTo(1, 6);
  expect(b!.df! / a!.df!).toBeCloseTo(1, 6);
});

test('many levels are keyed by level; the first in code-unit order is the reference', () => {
  const level = (s: string): string => ({ a: 'zeta', b: 'Zeta', c: '10', d: '9' })[s] ?? '9';
  const rows = [...ordinary(), ['d', 2, 10], ['a', 3, 14], ['b', 1, 9]] as Row[];
  const result = answer(rows.map(([s, t, y]): Row => [s, t, y, level(s)]));
  expect(result.group_levels).toEqual(['10', '9', 'Zeta', 'zeta']);
  expect(Object.keys(result.pooled?.coefficients ?? {})).toEqual([
    'intercept',
    'time',
    'group:9',
    'group:Zeta',
    'group:zeta',
    'time_by_group:9',
    'time_by_group:Zeta',
    'time_by_group:zeta',
  ]);
});

describe('the lock', () => {
  test('repeats lock the ordinary line; the reason opens it', () => {
    const locked = analyseRows(ordinary(), { draws: 99 });
    expect(locked.ols).toBeNull();
    expect(typeof locked.ols_locked).toBe('string');
    expect(holes(locked)).toEqual([]);
    // Locked means that no ordinary error or p stands anywhere; the ratio of errors does.
    expect(Object.keys(pooledOf(locked, 'time'))).not.toContain('se_ols');
    expect(locked.independence?.se_ratio?.time).toBeTypeOf('number');
    const open = answer(ordinary());
    expect(open.ols?.coefficients.time?.se).toBeCloseTo(0.8614679, 7);
    expect(open.ols_locked).toBeNull();
  });
});

test('parts left out are null with a reason, the others as ever', () => {
  const whole = answer(ordinary());
  const only = analyseRows(ordinary(), { ...OPTIONS, only: ['lines'] });
  expect(holes(only)).toEqual([]);
  expect(only.pooled).toBeNull();
  expect(only.independence).toBeNull();
  expect(only.per_subject).toEqual(whole.per_subject);
  expect(only.structure).toEqual(whole.structure);
});
