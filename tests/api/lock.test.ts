import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { TestDatabase } from '../support/test-database.ts';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { ARMS } from './analysis-study.ts';

let database: TestDatabase;
let app: AnalystApp;
let cut: string;
let otherCut: string;

const specification = {
  measure: 'reaction',
  axis: 'since_baseline',
  unit: 'days',
  group: false,
} as const;
const reason = 'The referee asked for the textbook line beside the robust one.';

beforeAll(async () => {
  app = await openAnalysis({ masked: true });
  ({ database } = app);
  const freeze = (name: string) =>
    app.post('analyst', '/cuts', {
      name,
      visitCutoff: '2026-11-30',
      measures: ['reaction', 'lapses', 'rested', 'place', 'age'],
      exclusions: [],
      includeWithdrawnReason: null,
    });
  cut = (await freeze('First')).body.id;
  otherCut = (await freeze('Second')).body.id;
});
afterAll(async () => {
  await app.close();
});

async function stored() {
  const [row] = await database.query(
    `SELECT (SELECT count(*) FROM specification)::int AS specifications,
            (SELECT count(*) FROM check_opening)::int AS openings,
            (SELECT count(*) FROM acknowledgement)::int AS acknowledgements,
            (SELECT count(*) FROM analysis_record)::int AS records,
            (SELECT count(*) FROM audit.entry)::int AS entries`,
  );
  return row;
}

const asking = (kind: 'pooled' | 'ordinary', change: object = {}) => ({
  specification: { ...specification, ...change },
  fit: kind,
  purpose: 'exploratory',
});

describe('the check comes before the fit', () => {
  it('refuses a fit and a reason before this person opened the check, and keeps nothing', async () => {
    const before = await stored();
    for (const kind of ['pooled', 'ordinary'] as const) {
      const answer = await app.post('analyst', `/cuts/${cut}/fits`, asking(kind));
      expect([answer.status, answer.body.code]).toEqual([409, 'check_not_opened']);
    }
    const early = await app.post('analyst', `/cuts/${cut}/acknowledgements`, {
      specification,
      reason,
    });
    expect([early.status, early.body.code]).toEqual([409, 'check_not_opened']);
    const after = await stored();
    expect({ ...after, entries: 0 }).toEqual({ ...before, entries: 0 });
  });

  it('opens the check in its six parts', async () => {
    const answer = await app.post('analyst', `/cuts/${cut}/check`, { specification });
    expect(answer.status).toBe(200);
    const check = answer.body;
    expect(check.specification).toMatchObject({ ...specification, number: 1 });
    expect(check.counts).toMatchObject({ rows: 180, used: 180, missing: 0, censored: 0 });
    expect(check.structure).toMatchObject({
      subjects: 18,
      readings: 180,
      subjects_with_repeats: 18,
    });
    expect(check.independence.warn).toBe(true);
    expect(check.independence.icc_residual.estimate).toBeCloseTo(0.5909, 4);
    expect(check.independence.design_effect).toBeCloseTo(6.318, 3);
    expect(check.independence.serial.permutation.p).toBeLessThan(0.01);
    expect(check.independence.variogram.bins.length).toBeGreaterThan(5);
    const time = check.consequences.find(
      (one: { coefficient: string }) => one.coefficient === 'time',
    );
    expect(time.seOrdinary).toBeCloseTo(1.238, 3);
    expect(time.seRobust).toBeCloseTo(1.54579, 5);
    expect(time.ordinaryErrorIs).toBe('too small');
    expect(check.observed).toHaveLength(18);
    expect(check.observed[0].id).toMatch(/^[0-9a-f-]{36}$/);
    const sorted = (list: { residuals: number[] }[]) =>
      list.flatMap((own) => own.residuals).sort((a, b) => a - b);
    const [seen, dealt] = [sorted(check.observed), sorted(check.dealt)];
    expect(dealt.every((value, at) => Math.abs(value - (seen[at] ?? Number.NaN)) < 1e-9)).toBe(
      true,
    );
    expect(check.advice.length).toBeGreaterThan(0);
    expect(check.lock).toEqual({ locked: true, acknowledgement: null });
  });

  it('numbers the specifications of a measure on a cut, whoever asks', async () => {
    const number = async (person: 'analyst' | 'second', where: string, change: object) =>
      (
        await app.post(person, `/cuts/${where}/check`, {
          specification: { ...specification, ...change },
        })
      ).body.specification.number;
    expect(await number('second', cut, {})).toBe(1);
    expect(await number('second', cut, { unit: 'weeks' })).toBe(2);
    expect(await number('analyst', cut, { axis: 'planned_day' })).toBe(3);
    expect(await number('analyst', cut, { measure: 'lapses' })).toBe(1);
    expect(await number('analyst', otherCut, { unit: 'weeks' })).toBe(1);
    expect(await number('analyst', cut, { unit: 'weeks' })).toBe(2);
  });

  it('cautions about a straight line through counts', async () => {
    const answer = await app.post('analyst', `/cuts/${cut}/check`, {
      specification: { ...specification, measure: 'lapses' },
    });
    expect(answer.body.cautions).toEqual([{ code: 'count' }]);
  });

  it.each([
    ['yes or no', { measure: 'rested' }, 'analysis_measure_yes_no', 'specification.measure'],
    ['a choice', { measure: 'place' }, 'analysis_measure_choice', 'specification.measure'],
    ['a measure read once', { measure: 'age' }, 'analysis_measure_once', 'specification.measure'],
    [
      'a measure not in the cut',
      { measure: 'weight' },
      'analysis_measure_unknown',
      'specification.measure',
    ],
    ['groups of a masked study', { group: true }, 'analysis_group_masked', 'specification.group'],
  ])('refuses %s in words, naming no arm', async (_what, change, code, path) => {
    const before = await stored();
    for (const answer of [
      await app.post('analyst', `/cuts/${cut}/check`, {
        specification: { ...specification, ...change },
      }),
      await app.post('analyst', `/cuts/${cut}/fits`, asking('pooled', change)),
    ]) {
      expect([answer.status, answer.body.code]).toEqual([422, code]);
      expect(answer.body.errors[0].path).toBe(path);
      expect(ARMS.some((arm) => answer.text.includes(arm))).toBe(false);
    }
    expect(await stored()).toEqual(before);
  });
});

describe('the lock on the ordinary fit', () => {
  it('stays shut without a reason, and with one of fewer than 20 characters', async () => {
    const before = await stored();
    const locked = await app.post('analyst', `/cuts/${cut}/fits`, asking('ordinary'));
    expect([locked.status, locked.body.code]).toEqual([409, 'ordinary_fit_locked']);
    for (const short of ['', 'because', '                    .   ']) {
      const answer = await app.post('analyst', `/cuts/${cut}/acknowledgements`, {
        specification,
        reason: short,
      });
      expect(answer.status).toBe(422);
      expect(answer.body.errors[0].path).toBe('reason');
    }
    expect((await app.post('analyst', `/cuts/${cut}/fits`, asking('ordinary'))).status).toBe(409);
    expect(await stored()).toEqual(before);
  });

  it('is not opened by another person, another specification or another cut', async () => {
    await app.post('analyst', `/cuts/${otherCut}/check`, { specification });
    const others = [
      await app.post('second', `/cuts/${cut}/acknowledgements`, { specification, reason }),
      await app.post('analyst', `/cuts/${cut}/acknowledgements`, {
        specification: { ...specification, unit: 'weeks' },
        reason,
      }),
      await app.post('analyst', `/cuts/${otherCut}/acknowledgements`, { specification, reason }),
    ];
    expect(others.map((answer) => answer.status)).toEqual([201, 201, 201]);
    const before = await stored();
    const answer = await app.post('analyst', `/cuts/${cut}/fits`, asking('ordinary'));
    expect([answer.status, answer.body.code]).toEqual([409, 'ordinary_fit_locked']);
    expect(await stored()).toEqual(before);
  });

  it('opens for this person, cut and specification, and everything from it is stamped', async () => {
    const opened = await app.post('analyst', `/cuts/${cut}/acknowledgements`, {
      specification,
      reason,
    });
    expect(opened.status).toBe(201);
    expect(opened.body).toEqual({ by: 'Robin analyst', at: '2026-12-01T12:00:00.000Z', reason });
    const answer = await app.post(
      'analyst',
      `/cuts/${cut}/fits`,
      asking('ordinary'),
      'ordinary-01',
    );
    expect(answer.status).toBe(201);
    expect(answer.body.stamp).toBe('independence not met');
    expect(answer.body.result.ols.coefficients.time.se).toBeCloseTo(1.238, 3);
    expect(answer.body.headline.df).toBe(178);
    expect(answer.body.acknowledgement.reason).toBe(reason);
    const point = answer.body.picture.band[0].points[0];
    expect(point.df).toBe(178);
    const file = await app.get('owner', `/records/${answer.body.id}/file`);
    expect(JSON.parse(file.text).stamp).toBe('independence not met');
    expect(JSON.parse(file.text).content.acknowledgement.reason).toBe(reason);
    const again = await app.post('analyst', `/cuts/${cut}/check`, { specification });
    expect(again.body.lock.locked).toBe(false);
    expect(again.body.lock.acknowledgement.reason).toBe(reason);
  });

  it('keeps the ordinary numbers out of every record of a pooled fit', async () => {
    const answer = await app.post('second', `/cuts/${cut}/fits`, asking('pooled'));
    expect(answer.status).toBe(201);
    expect(answer.body.stamp).toBeNull();
    expect(answer.body.result.ols).toBeNull();
    const file = await app.get('second', `/records/${answer.body.id}/file`);
    for (const text of [answer.text, file.text]) {
      // The ordinary error of the slope and of the intercept, as R's lm gives them.
      expect(text).not.toMatch(/1\.23819|6\.61015/);
      expect(text).not.toContain('"seOrdinary"');
    }
    expect(JSON.parse(file.text)).not.toHaveProperty('stamp');
    const check = await app.post('second', `/cuts/${cut}/check`, { specification });
    const trail = await database.query<{ body: string }>(
      `SELECT body FROM audit.entry WHERE action <> 'study set up'`,
    );
    // The allocation is loaded and sealed; nothing that a masked person reads, or the trail, knows it.
    for (const text of [answer.text, file.text, check.text, ...trail.map((row) => row.body)]) {
      expect(ARMS.some((arm) => text.includes(arm))).toBe(false);
    }
  });

  it('cannot be taken back or written around at the database', async () => {
    const { masked } = await database.databases();
    for (const table of ['acknowledgement', 'analysis_record', 'specification']) {
      await expect(masked.query(`DELETE FROM ${table}`)).rejects.toThrow();
      await expect(database.query(`DELETE FROM ${table}`)).rejects.toThrow();
    }
    await expect(
      masked.query(`INSERT INTO acknowledgement (specification_id, account_id, reason, at)
                    SELECT specification_id, account_id, 'too short', at FROM acknowledgement`),
    ).rejects.toThrow();
  });
});
