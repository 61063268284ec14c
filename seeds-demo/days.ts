/** Calendar days as text (yyyy-mm-dd), counted without any time zone. */

const MS_A_DAY = 86_400_000;

export function addDays(day: string, days: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + days * MS_A_DAY).toISOString().slice(0, 10);
}

export function daysBetween(from: string, to: string): number {
  return Math.round((Date.parse(`${to}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / MS_A_DAY);
}

/** The moment of an entry on that day; hours are UTC and within a working day in the demo's zone. */
export function momentOf(day: string, hour: number, minute: number): Date {
  const pad = (value: number) => String(value).padStart(2, '0');
  return new Date(`${day}T${pad(hour)}:${pad(minute)}:00.000Z`);
}
