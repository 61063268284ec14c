/** Dates and times as pages print them: "1 Mar 2027", and times always with their zone. */
const MONTHS = [
  'Jan',
  'Feb',
  'Mar',
  'Apr',
  'May',
  'Jun',
  'Jul',
  'Aug',
  'Sep',
  'Oct',
  'Nov',
  'Dec',
] as const;
const NONE = '\u2014';

/**
 * A calendar day, `YYYY-MM-DD`, or a part of one: `YYYY-MM` and `YYYY` stay as partial as they are.
 * A day has no zone, so no clock takes part here.
 */
export function formatDay(day: string | null | undefined): string {
  if (!day) return NONE;
  const [year, month, date] = day.slice(0, 10).split('-');
  const name = month ? MONTHS[Number(month) - 1] : undefined;
  if (!year) return NONE;
  if (!name) return year;
  return date ? `${Number(date)} ${name} ${year}` : `${name} ${year}`;
}

/** A moment with its zone: "1 Mar 2027, 14:05 GMT". */
export function formatMoment(moment: string | null | undefined, zone: string): string {
  if (!moment) return NONE;
  const at = new Date(moment);
  if (Number.isNaN(at.getTime())) return NONE;
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    day: 'numeric',
    month: 'numeric',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZoneName: 'short',
  }).formatToParts(at);
  const part = (type: Intl.DateTimeFormatPartTypes) =>
    parts.find((each) => each.type === type)?.value ?? '';
  const day = `${Number(part('day'))} ${MONTHS[Number(part('month')) - 1] ?? ''} ${part('year')}`;
  return `${day}, ${part('hour')}:${part('minute')} ${part('timeZoneName')}`;
}

/** The day of a moment in a zone, as `YYYY-MM-DD`. */
export function dayOf(moment: string, zone: string): string {
  return new Intl.DateTimeFormat('sv-SE', {
    timeZone: zone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).format(new Date(moment));
}
