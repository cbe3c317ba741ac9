/** A moment as a person of this place reads it: day and time apart. */
import { DEFAULT_LOCALE, type Locale } from "../../domain/format.ts";

/** "1 Dec 2026", in the zone of this machine unless one is given. */
export function dayHeading(atUtc: string, locale: Locale = DEFAULT_LOCALE, timeZone?: string): string {
  return part(atUtc, locale, { day: "numeric", month: "short", year: "numeric" }, timeZone);
}

/** "07:22:18" */
export function timeOf(atUtc: string, locale: Locale = DEFAULT_LOCALE, timeZone?: string): string {
  return part(atUtc, locale, { hour: "2-digit", minute: "2-digit", second: "2-digit" }, timeZone);
}

function part(atUtc: string, { tag }: Locale, options: Intl.DateTimeFormatOptions, timeZone?: string): string {
  const moment = new Date(atUtc);
  if (Number.isNaN(moment.getTime())) return atUtc;
  return new Intl.DateTimeFormat(tag, timeZone === undefined ? options : { ...options, timeZone }).format(moment);
}
