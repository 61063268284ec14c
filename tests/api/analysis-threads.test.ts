import { describe, expect, it } from 'vitest';
import { tableOfCut } from '../../api/analysis-threads/cut-table.ts';
import { bandTimes, drawingOf, usedReadings } from '../../api/analysis-threads/picture.ts';

const csv = [
  'subject,site,visit,planned,day,planned_day,replicate,y,y_note',
  'a,s,V1,1,0,0,1,1,',
  'a,s,V2,1,8,7,1,3,',
  'a,s,unscheduled,0,10,,1,4,',
  'b,s,V1,1,0,0,1,,<0.5',
  'b,s,V2,1,7,7,1,,not done: subject refused',
  'b,s,V3,1,14,14,1,,"excluded: plate, not levelled"',
  'c,s,V1,1,0,0,1,2,',
  'c,s,V2,1,,7,1,,',
  'c,s,unscheduled,0,,,1,9,',
  '',
].join('\n');
const bytes = new TextEncoder().encode(csv);
const days = { measure: 'y', axis: 'since_baseline', unit: 'days', group: false } as const;

describe('table of a cut', () => {
  it('counts every row once, censored apart from missing', () => {
    const { counts, table } = tableOfCut(bytes, days);
    expect(counts).toEqual({
      rows: 9,
      used: 4,
      missing: 1,
      censored: 1,
      notDone: 1,
      excluded: 1,
      noTime: 1,
      noGroup: 0,
    });
    expect([...table.time.slice(0, 3)]).toEqual([0, 8, 10]);
  });

  it('takes the planned day, in weeks, as its time axis', () => {
    const { table, counts } = tableOfCut(bytes, { ...days, axis: 'planned_day', unit: 'weeks' });
    expect([...table.time.slice(0, 2)]).toEqual([0, 1]);
    expect(counts.noTime).toBe(2);
  });
});

describe('picture', () => {
  it('counts readings by planned visit and who remains', () => {
    const readings = usedReadings(tableOfCut(bytes, days));
    expect(bandTimes(readings)).toHaveLength(49);
    const line = [0, 5, 10].map((time) => ({
      group: null,
      time,
      estimate: time,
      lower: null,
      upper: null,
      df: null,
    }));
    const picture = drawingOf(readings, 'days', line);
    expect(picture.visits).toEqual([
      { name: 'V1', time: 0, n: 2 },
      { name: 'V2', time: 7, n: 1 },
    ]);
    expect(picture.band[0]?.points.map((point) => point.remaining)).toEqual([2, 1, 1]);
    expect(picture.subjects.map((subject) => subject.readings.length)).toEqual([3, 1]);
  });
});
