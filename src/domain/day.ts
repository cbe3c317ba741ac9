/**
 * Plain calendar days as ISO 8601 text (YYYY-MM-DD), and day numbers: whole days since 1970-01-01.
 * No time zones, no clock: a sale happens on a day.
 */

/** ISO 8601 calendar day, YYYY-MM-DD. */
export type Day = string;

/** Mean Gregorian year in days; age in years and "months" of market movement are measured with it. */
export const DAYS_PER_YEAR = 365.2425;
export const DAYS_PER_MONTH = DAYS_PER_YEAR / 12;

const ISO_DAY = /^(\d{4})-(\d{2})-(\d{2})$/;
const MS_PER_DAY = 86_400_000;

/** Day number of a real calendar day, or null ("2025-02-30" is no day). */
export function dayNumber(day: Day): number | null {
  const match = ISO_DAY.exec(day);
  if (match === null) return null;
  const [year, month, date] = [Number(match[1]), Number(match[2]), Number(match[3])];
  const ms = Date.UTC(year, month - 1, date);
  const back = new Date(ms);
  if (year < 100 || back.getUTCMonth() !== month - 1 || back.getUTCDate() !== date) return null;
  return Math.round(ms / MS_PER_DAY);
}

/** ISO day of a day number (whole). */
export function dayOf(number: number): Day {
  return new Date(Math.round(number) * MS_PER_DAY).toISOString().slice(0, 10);
}

export function isDay(text: string): text is Day {
  return dayNumber(text) !== null;
}

/** Years from one day number to another (negative when reversed). */
export function yearsBetween(fromDayNumber: number, toDayNumber: number): number {
  return (toDayNumber - fromDayNumber) / DAYS_PER_YEAR;
}
