/** Day-month or month-day, from every day in every column that holds days; a number above 12 decides. */
import type { ReadingOptions } from "../domain/importRecord.ts";
import type { RawRow } from "./rawTable.ts";
import { looksLikeDay, TWO_NUMBERS } from "./readDay.ts";

type DateOrder = ReadingOptions["dateOrder"];

interface Tally {
  /** The first number is above 12, so it is the day. */
  dayFirst: number;
  monthFirst: number;
  either: number;
  points: number;
  /** Year first, or the month by name. */
  plain: number;
}

function tallyColumn(rows: readonly RawRow[], column: number, tally: Tally): void {
  const own: Tally = { dayFirst: 0, monthFirst: 0, either: 0, points: 0, plain: 0 };
  let filled = 0;
  for (const { cells } of rows) {
    const cell = cells[column]?.trim() ?? "";
    if (cell === "") continue;
    filled++;
    const days = own.dayFirst + own.monthFirst + own.either + own.plain;
    if (filled === 200 && days < 100) return;
    const two = TWO_NUMBERS.exec(cell);
    if (two === null) {
      if (looksLikeDay(cell)) own.plain++;
      continue;
    }
    if (two[2] === ".") own.points++;
    if (Number(two[1]) > 12) own.dayFirst++;
    else if (Number(two[3]) > 12) own.monthFirst++;
    else own.either++;
  }
  if ((own.dayFirst + own.monthFirst + own.either + own.plain) * 2 <= filled) return;
  for (const key of Object.keys(tally) as (keyof Tally)[]) tally[key] += own[key];
}

export function detectDateOrder(
  rows: readonly RawRow[],
  headings: readonly string[],
  chosen: DateOrder | undefined,
): { dateOrder: DateOrder; sentence: string } {
  if (chosen !== undefined) return { dateOrder: chosen, sentence: "The order of day, month and year is as chosen." };
  const tally: Tally = { dayFirst: 0, monthFirst: 0, either: 0, points: 0, plain: 0 };
  for (let column = 0; column < headings.length; column++) tallyColumn(rows, column, tally);
  const { dayFirst, monthFirst, either, points, plain } = tally;
  if (dayFirst + monthFirst + either === 0) {
    const sentence =
      plain === 0 ? "No column of days was found." : "Days are written with the year first or the month by name.";
    return { dateOrder: "ymd", sentence };
  }
  if (dayFirst === 0 && monthFirst === 0) {
    if (points > 0) return { dateOrder: "dmy", sentence: "Days with points between are read day first, as is usual." };
    return { dateOrder: "dmy", sentence: "Every date could be day-month or month-day; read as day-month." };
  }
  const dateOrder = dayFirst >= monthFirst ? "dmy" : "mdy";
  const [most, least] = dateOrder === "dmy" ? [dayFirst, monthFirst] : [monthFirst, dayFirst];
  const words = dateOrder === "dmy" ? "day first" : "month first";
  const against = least === 0 ? "" : ` ${least} would need it the other way round.`;
  const which = most === 1 ? "1 date has" : `${most} dates have`;
  return { dateOrder, sentence: `Dates are read ${words}: ${which} a number above 12 there.${against}` };
}
