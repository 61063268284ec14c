/** Calendar days as `YYYY-MM-DD` text, counted without a clock or a time zone. */

const MS_PER_DAY = 86_400_000;

/** Days since 1970-01-01 of a calendar day. */
function dayNumber(day: string): number {
  const ms = Date.parse(`${day}T00:00:00Z`);
  if (Number.isNaN(ms)) {
    throw new RangeError(`not a calendar day: ${day}`);
  }
  return Math.round(ms / MS_PER_DAY);
}

/** Whole days from one calendar day to another; negative when `to` is earlier. */
export function daysBetween(from: string, to: string): number {
  return dayNumber(to) - dayNumber(from);
}

/** The calendar day a number of days later (or earlier). */
export function addDays(day: string, days: number): string {
  return new Date((dayNumber(day) + days) * MS_PER_DAY).toISOString().slice(0, 10);
}

/** Whether the text names a day that is in the calendar (30 February is not). */
export function isCalendarDay(day: string): boolean {
  const ms = Date.parse(`${day}T00:00:00Z`);
  return !Number.isNaN(ms) && new Date(ms).toISOString().slice(0, 10) === day;
}

/** The calendar day on a wall clock in the zone at that moment. */
export function dayInZone(at: Date, zone: string): string {
  // The Swedish locale writes ISO days.
  return new Intl.DateTimeFormat('sv-SE', { timeZone: zone, dateStyle: 'short' }).format(at);
}
