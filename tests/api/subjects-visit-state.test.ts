import { describe, expect, it } from 'vitest';
import { addDays, dayInZone, daysBetween } from '../../api/features/cuts/days.ts';
import { buildCord } from '../../api/features/subjects/cord.ts';
import { placeDay } from '../../api/features/visits/place-day.ts';
import {
  type FollowUp,
  type LoggedVisit,
  plannedVisitState,
} from '../../api/features/visits/visit-state.ts';

/** Week 4: target day 28, window 5 before and 7 after, so days 23 to 35. */
const WEEK_4 = { targetDay: 28, windowBefore: 5, windowAfter: 7 };
const BASELINE = '2026-03-02';

const followUp = (today: string, over: Partial<FollowUp> = {}): FollowUp => ({
  baselineDate: BASELINE,
  today,
  endDate: null,
  closingDays: 3,
  ...over,
});
const onDay = (day: number) => addDays(BASELINE, day);
const visit = (over: Partial<LoggedVisit> = {}): LoggedVisit => ({
  date: onDay(28),
  datePrecision: 'day',
  missed: false,
  measuresDue: 3,
  measuresTaken: 3,
  ...over,
});

describe('a planned visit that is not logged', () => {
  it.each([
    [22, 'upcoming'],
    [23, 'open'],
    [28, 'open'],
    [32, 'open'],
    [33, 'closing'],
    [35, 'closing'],
    [36, 'overdue'],
  ])('is on day %i %s', (day, state) => {
    expect(plannedVisitState(WEEK_4, followUp(onDay(day)), null)).toMatchObject({
      state,
      windowFrom: 23,
      windowTo: 35,
      day: null,
      outOfWindow: false,
      afterEnd: false,
    });
  });

  it('closes on its only day where it has no window, and never closes without closing days', () => {
    const dayOnly = { targetDay: 0, windowBefore: 0, windowAfter: 0 };
    expect(plannedVisitState(dayOnly, followUp(BASELINE), null).state).toBe('closing');
    expect(plannedVisitState(dayOnly, followUp(BASELINE, { closingDays: 0 }), null).state).toBe(
      'open',
    );
  });

  it('is upcoming while there is no baseline date', () => {
    expect(
      plannedVisitState(WEEK_4, followUp('2026-12-01', { baselineDate: null }), null),
    ).toMatchObject({ state: 'upcoming', afterEnd: false });
  });

  it('is no longer due once follow-up ended before its window closed', () => {
    const ended = (day: number) => followUp(onDay(200), { endDate: onDay(day) });
    expect(plannedVisitState(WEEK_4, ended(34), null)).toMatchObject({
      state: 'upcoming',
      afterEnd: true,
    });
    expect(plannedVisitState(WEEK_4, ended(35), null)).toMatchObject({
      state: 'overdue',
      afterEnd: false,
    });
  });
});

describe('a planned visit that is logged', () => {
  const at = followUp(onDay(200));
  it.each([
    [{ measuresTaken: 3 }, 'done'],
    [{ measuresTaken: 1 }, 'partly done'],
    [{ measuresTaken: 0 }, 'missed'],
    [{ measuresDue: 0, measuresTaken: 0 }, 'done'],
    [{ missed: true, date: null, measuresTaken: 0 }, 'missed'],
  ] as const)('%j is %s', (over, state) => {
    expect(plannedVisitState(WEEK_4, at, visit(over)).state).toBe(state);
  });

  it.each([
    [22, true],
    [23, false],
    [35, false],
    [36, true],
  ])('on day %i is out of its window: %s', (day, outOfWindow) => {
    expect(plannedVisitState(WEEK_4, at, visit({ date: onDay(day) }))).toMatchObject({
      state: 'done',
      day,
      outOfWindow,
    });
  });

  it('is not judged by a partial date', () => {
    const partial = visit({ date: '2026-05-01', datePrecision: 'month' });
    expect(plannedVisitState(WEEK_4, at, partial)).toMatchObject({
      state: 'done',
      day: null,
      outOfWindow: false,
    });
  });

  it('stays done after follow-up ended', () => {
    const ended = followUp(onDay(200), { endDate: onDay(10) });
    expect(plannedVisitState(WEEK_4, ended, visit())).toMatchObject({
      state: 'done',
      afterEnd: false,
    });
  });
});

describe('days', () => {
  it('are those of the site, on both sides of a change of the clock', () => {
    // London, 29 March 2026: 00:30 UTC is still winter time; at 01:00 UTC the clock goes to 02:00.
    expect(dayInZone(new Date('2026-03-28T23:59:00Z'), 'Europe/London')).toBe('2026-03-28');
    expect(dayInZone(new Date('2026-03-29T00:30:00Z'), 'Europe/London')).toBe('2026-03-29');
    // In summer time the day begins at 23:00 UTC.
    expect(dayInZone(new Date('2026-03-29T23:30:00Z'), 'Europe/London')).toBe('2026-03-30');
    // 25 October 2026: 00:30 UTC and 01:30 UTC are both half past one on the wall; the day is one.
    expect(dayInZone(new Date('2026-10-25T00:30:00Z'), 'Europe/London')).toBe('2026-10-25');
    expect(dayInZone(new Date('2026-10-25T23:30:00Z'), 'Europe/London')).toBe('2026-10-25');
    // One moment, two sites, two days.
    expect(dayInZone(new Date('2026-12-01T11:00:00Z'), 'Pacific/Auckland')).toBe('2026-12-02');
    expect(dayInZone(new Date('2026-12-01T11:00:00Z'), 'America/Los_Angeles')).toBe('2026-12-01');
  });

  it('lose or gain none where a day of a window has 23 or 25 hours', () => {
    // 2 March + 28 days = 30 March 2026, over the change of 29 March; 28 days later 27 April.
    expect(onDay(28)).toBe('2026-03-30');
    expect(daysBetween('2026-03-28', '2026-03-30')).toBe(2);
    expect(addDays('2026-10-24', 2)).toBe('2026-10-26');
  });

  it('count 29 February where there is one', () => {
    expect(addDays('2028-02-28', 1)).toBe('2028-02-29');
    expect(addDays('2028-02-29', 365)).toBe('2029-02-28');
    expect(daysBetween('2028-02-01', '2028-03-01')).toBe(29);
    expect(daysBetween('2027-02-01', '2027-03-01')).toBe(28);
    const leap = followUp('2028-03-11', { baselineDate: '2028-02-29' });
    // Day 11 after 29 February is 11 March: the last day of this window.
    expect(
      plannedVisitState({ targetDay: 10, windowBefore: 1, windowAfter: 1 }, leap, null).state,
    ).toBe('closing');
  });
});

describe('placing a day', () => {
  const plan = (name: string, targetDay: number, windowBefore: number, windowAfter: number) => ({
    name,
    targetDay,
    windowBefore,
    windowAfter,
  });
  // Windows 20–36 and 30–50: days 30 to 36 lie in both.
  const plans = [plan('Week 4', 28, 8, 8), plan('Week 6', 40, 10, 10)];

  it.each([
    [19, undefined],
    [20, 'Week 4'],
    [30, 'Week 4'],
    [33, 'Week 4'],
    [34, 'Week 6'],
    [35, 'Week 6'],
    [50, 'Week 6'],
    [51, undefined],
  ])('day %i belongs to %s', (day, name) => {
    expect(placeDay(day, plans)?.name).toBe(name);
    expect(placeDay(day, [...plans].reverse())?.name).toBe(name);
  });
});

describe('a cord', () => {
  it('puts knots in order of time, unscheduled ones among them, and ends with the word', () => {
    const planned = [
      { id: '1', uid: 'p1', name: 'Baseline', targetDay: 0, windowBefore: 0, windowAfter: 3 },
      { id: '2', uid: 'p2', name: 'Week 4', ...WEEK_4 },
      { id: '3', uid: 'p3', name: 'Week 8', targetDay: 56, windowBefore: 5, windowAfter: 5 },
    ];
    const done = { missed: false, measuresDue: 1, measuresTaken: 1, datePrecision: 'day' } as const;
    const cord = buildCord(
      { state: 'withdrawn from visits', stateDate: onDay(40), baselineDate: BASELINE },
      planned,
      [
        { ...done, id: '10', uid: 'v10', plannedVisitId: '1', date: onDay(0) },
        { ...done, id: '11', uid: 'v11', plannedVisitId: null, date: onDay(12) },
        { ...done, id: '12', uid: 'v12', plannedVisitId: '2', date: onDay(37) },
      ],
      onDay(60),
      3,
    );
    expect(cord.today).toBe(60);
    expect(cord.end).toEqual({ word: 'withdrawn from visits', day: 40 });
    expect(cord.visits.map((knot) => [knot.name, knot.state, knot.day, knot.afterEnd])).toEqual([
      ['Baseline', 'done', 0, false],
      ['unscheduled', 'unscheduled', 12, false],
      ['Week 4', 'done', 37, false],
      ['Week 8', 'upcoming', null, true],
    ]);
    expect(cord.visits[2]?.outOfWindow).toBe(true);
  });
});
