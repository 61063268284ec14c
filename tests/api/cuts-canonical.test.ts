import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { differenceOfCuts } from '../../api/analysis-threads/difference.ts';
import { CanonicalCsvWriter, columnOrder } from '../../api/features/cuts/canonical-csv.ts';
import { rowsOfSubject } from '../../api/features/cuts/cut-rows.ts';
import type { CutPlan, ReadingOfCut, SubjectOfCut } from '../../api/features/cuts/cut-shapes.ts';
import { addDays, daysBetween, isCalendarDay } from '../../api/features/cuts/days.ts';
import { numberText } from '../../api/features/cuts/number-text.ts';

describe('number text', () => {
  it.each([
    [0, '0'],
    [-0, '0'],
    [0.1, '0.1'],
    [1e21, '1000000000000000000000'],
    [1.5e-7, '0.00000015'],
    [-2.5e-9, '-0.0000000025'],
    [1.2345e22, '12345000000000000000000'],
    [Number.MAX_VALUE, `17976931348623157${'0'.repeat(292)}`],
    [5e-324, `0.${'0'.repeat(323)}5`],
  ])('%d is %s', (value, text) => {
    expect(numberText(value)).toBe(text);
  });

  it('reads back to the same double and never has an exponent', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const text = numberText(value);
        expect(text).toMatch(/^-?\d+(\.\d+)?$/);
        expect(Number(text)).toBe(value === 0 ? 0 : value);
      }),
    );
  });

  it('refuses what no reading can hold', () => {
    expect(() => numberText(Number.NaN)).toThrow(RangeError);
    expect(() => numberText(Number.POSITIVE_INFINITY)).toThrow(RangeError);
  });
});

describe('days', () => {
  it('counts over a leap day and a change of the clock', () => {
    expect(daysBetween('2028-02-28', '2028-03-01')).toBe(2);
    expect(daysBetween('2026-03-28', '2026-03-30')).toBe(2);
    expect(addDays('2028-02-28', 1)).toBe('2028-02-29');
    expect(isCalendarDay('2027-02-29')).toBe(false);
  });
});

const plan: CutPlan = {
  visitCutoff: '2026-03-31',
  lateDays: 14,
  plannedVisits: [
    { id: 'p0', name: 'Baseline', targetDay: 0, windowAfter: 0 },
    { id: 'p1', name: 'Week 4', targetDay: 28, windowAfter: 3 },
    { id: 'p2', name: 'Week 8', targetDay: 56, windowAfter: 3 },
    { id: 'p3', name: 'Week 52', targetDay: 364, windowAfter: 7 },
  ],
  measures: [
    { shortName: 'sway', per: 'visit' },
    { shortName: 'age', per: 'subject' },
  ],
};

function reading(over: Partial<ReadingOfCut>): ReadingOfCut {
  return {
    visitId: null,
    measure: 'sway',
    replicate: 1,
    value: null,
    choice: null,
    limitSign: null,
    limitValue: null,
    notDone: null,
    enteredAt: '2026-01-01T09:00:00.000Z',
    enteredDay: '2026-01-01',
    ...over,
  };
}

const subject: SubjectOfCut = {
  uid: 'u1',
  code: 'A-01',
  site: 'alder',
  group: 'walk',
  baselineDate: '2026-01-01',
  state: 'enrolled',
  stateDate: null,
  visits: [
    { id: 'v1', plannedVisitId: 'p0', date: '2026-01-01', precision: 'day' },
    { id: 'v2', plannedVisitId: null, date: '2026-01-29', precision: 'day' },
    { id: 'v3', plannedVisitId: 'p1', date: '2026-01-29', precision: 'day' },
    { id: 'v4', plannedVisitId: null, date: '2026-02-01', precision: 'month' },
    { id: 'v5', plannedVisitId: null, date: '2026-04-02', precision: 'day' },
  ],
  readings: [
    reading({ visitId: 'v1', value: 12.5 }),
    reading({ visitId: 'v1', value: -0, replicate: 2 }),
    reading({ visitId: 'v2', limitSign: '<', limitValue: 0.5 }),
    reading({ visitId: 'v3', notDone: 'subject refused', enteredDay: '2026-02-13' }),
    reading({ visitId: 'v4', value: 3 }),
    reading({ visitId: 'v5', value: 4 }),
    reading({ measure: 'age', value: 71 }),
  ],
};

function csvOf(rows: ReturnType<typeof rowsOfSubject>['rows'], withGroup = false) {
  const writer = new CanonicalCsvWriter(['sway', 'age'], withGroup);
  for (const row of rows) {
    writer.write(row);
  }
  const { chunks, sha256 } = writer.finish();
  return { text: Buffer.concat(chunks).toString('utf8'), sha256 };
}

describe('rows of a subject', () => {
  it('writes what was due or taken, in canonical order, with the once-per-subject measure in each', () => {
    const { rows, readings, late, pending } = rowsOfSubject(subject, plan, []);
    expect(csvOf(rows).text).toBe(
      [
        'subject,site,visit,planned,day,planned_day,replicate,age,age_note,sway,sway_note',
        'A-01,alder,Baseline,1,0,0,1,71,,12.5,',
        'A-01,alder,Baseline,1,0,0,2,71,,0,',
        'A-01,alder,Week 4,1,28,28,1,71,,,not done: subject refused',
        'A-01,alder,unscheduled,0,28,,1,71,,,<0.5',
        'A-01,alder,Week 8,1,,56,1,71,,,',
        'A-01,alder,unscheduled,0,,,1,71,,3,',
        '',
      ].join('\n'),
    );
    expect(readings).toBe(6);
    expect(pending).toEqual([{ subjectCode: 'A-01', visit: 'Week 8', windowClosed: '2026-03-01' }]);
    expect(late.map((one) => [one.visit, one.days])).toEqual([['Week 4', 15]]);
  });

  it('writes the group only when asked', () => {
    const { rows } = rowsOfSubject(subject, plan, []);
    expect(csvOf(rows).text).not.toContain('walk');
    expect(csvOf(rows, true).text.split('\n')[1]).toBe(
      'A-01,alder,Baseline,1,0,0,1,walk,71,,12.5,',
    );
  });

  it('leaves out an excluded reading with its reason, quoted where the comma needs it', () => {
    const { rows, readings } = rowsOfSubject(subject, plan, [
      { measure: 'sway', visit: 'Baseline', reason: 'plate, not levelled' },
    ]);
    expect(csvOf(rows).text.split('\n')[1]).toBe(
      'A-01,alder,Baseline,1,0,0,1,71,,,"excluded: plate, not levelled"',
    );
    expect(readings).toBe(4);
  });

  it('expects nothing of a subject who had ended before the window closed', () => {
    const died: SubjectOfCut = { ...subject, state: 'died', stateDate: '2026-02-28' };
    expect(rowsOfSubject(died, plan, []).pending).toEqual([]);
    const stopped: SubjectOfCut = {
      ...subject,
      state: 'stopped the intervention but followed',
      stateDate: '2026-02-01',
    };
    expect(rowsOfSubject(stopped, plan, []).pending).toHaveLength(1);
  });

  it('has no pending visit where a reason for missing it is known', () => {
    const missed: SubjectOfCut = {
      ...subject,
      visits: [...subject.visits, { id: 'v6', plannedVisitId: 'p2', date: null, precision: 'day' }],
    };
    const { rows, pending } = rowsOfSubject(missed, plan, []);
    expect(pending).toEqual([]);
    expect(rows.filter((row) => row.visit === 'Week 8')).toHaveLength(1);
  });

  it('hashes exactly the bytes it gives', () => {
    const { text, sha256 } = csvOf(rowsOfSubject(subject, plan, []).rows);
    expect(createHash('sha256').update(text).digest('hex')).toBe(sha256);
  });

  it('orders measures by code units', () => {
    expect(columnOrder(['b', 'a_1', 'a', 'a'])).toEqual(['a', 'a_1', 'b']);
  });
});

describe('difference of two cuts', () => {
  const head = 'subject,site,visit,planned,day,planned_day,replicate,y,y_note\n';

  it('counts rows by subject, visit and replicate', () => {
    const before = `${head}a,s,V1,1,0,0,1,1,\na,s,unscheduled,0,5,,1,2,\nb,s,V1,1,0,0,1,3,\n`;
    const after = `${head}a,s,V1,1,0,0,1,1.5,\na,s,unscheduled,0,5,,1,2,\na,s,unscheduled,0,5,,1,2,\n`;
    expect(differenceOfCuts(before, after)).toEqual({ added: 1, changed: 1, gone: 1 });
    expect(differenceOfCuts(before, before)).toEqual({ added: 0, changed: 0, gone: 0 });
  });

  it('compares the columns that both hold', () => {
    const other =
      'subject,site,visit,planned,day,planned_day,replicate,z,z_note\na,s,V1,1,0,0,1,9,\n';
    expect(differenceOfCuts(`${head}a,s,V1,1,0,0,1,1,\n`, other)).toEqual({
      added: 0,
      changed: 0,
      gone: 0,
    });
  });
});
