import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type AnalystApp, openAnalysis } from './analysis-app.ts';
import { ARMS } from './analysis-study.ts';

let app: AnalystApp;
let cut: string;

const specification = {
  measure: 'reaction',
  axis: 'since_baseline',
  unit: 'weeks',
  group: true,
} as const;

beforeAll(async () => {
  app = await openAnalysis({ masked: false });
  const frozen = await app.post('analyst', '/cuts', {
    name: 'Open groups',
    visitCutoff: '2026-11-30',
    measures: ['reaction'],
    exclusions: [],
    includeWithdrawnReason: null,
  });
  expect(frozen.body.groups).toEqual([...ARMS]);
  cut = frozen.body.id;
});
afterAll(() => app.close());

describe('a study that is not masked', () => {
  it('has the group in its cut, after the replicate', async () => {
    const { text } = await app.get('analyst', `/cuts/${cut}/file`);
    const [header, first] = text.split('\n');
    expect(header).toBe(
      'subject,site,visit,planned,day,planned_day,replicate,group,reaction,reaction_note',
    );
    expect(first).toBe(`308,quay,Day 0,1,0,0,1,${ARMS[0]},249.56,`);
  });

  it('checks and fits time by group, on weeks, with a band for each group', async () => {
    const check = await app.post('analyst', `/cuts/${cut}/check`, { specification });
    expect(check.status).toBe(200);
    expect(check.body.consequences.map((one: { coefficient: string }) => one.coefficient)).toEqual([
      'intercept',
      'time',
      'group',
      'time_by_group',
    ]);
    const answer = await app.post('analyst', `/cuts/${cut}/fits`, {
      specification,
      fit: 'pooled',
      purpose: 'planned',
    });
    expect(answer.status).toBe(201);
    const { result, picture } = answer.body;
    expect(result.group_levels).toEqual([...ARMS]);
    // Nine subjects a group, balanced: the slopes of the groups average to the pooled slope, a week at a time.
    const { time, time_by_group: difference } = result.pooled.coefficients;
    expect(time.estimate + difference.estimate / 2).toBeCloseTo(7 * 10.46728595959596, 8);
    expect(picture.band.map((band: { group: string }) => band.group)).toEqual([...ARMS]);
    expect(picture.band[0].points.at(-1).time).toBeCloseTo(9 / 7, 12);
    expect(picture.band[0].points[0].remaining).toBe(9);
    expect(new Set(picture.subjects.map((one: { group: string }) => one.group)).size).toBe(2);
    expect(picture.visits[7].time).toBe(1);
  });

  it('counts asking with groups as another specification than without', async () => {
    const without = await app.post('analyst', `/cuts/${cut}/check`, {
      specification: { ...specification, group: false },
    });
    expect(without.body.specification.number).toBe(2);
  });
});
