/** Which detected sentence speaks of which reading option; what speaks of none is kept apart, so that nothing goes unsaid. */
import type { ReadingOptions } from "../../../domain/importRecord.ts";

export type OptionName = keyof ReadingOptions;

const SPEAKS_OF: Readonly<Record<OptionName, RegExp>> = {
  encoding: /^Read as |could not be read as /,
  delimiter: /separat/i,
  decimalMark: /decimal mark|thousands or decimals/,
  thousandsMark: /^Thousands /,
  dateOrder: /^Dates |^Days |^Every date|order of day|^No date/,
  hasHeading: /heading|first row/i,
};

export interface SortedSentences {
  readonly by: Readonly<Record<OptionName, string>>;
  readonly rest: readonly string[];
}

export function sortSentences(detected: readonly string[]): SortedSentences {
  const by: Record<OptionName, string> = {
    encoding: "",
    delimiter: "",
    decimalMark: "",
    thousandsMark: "",
    dateOrder: "",
    hasHeading: "",
  };
  const rest: string[] = [];
  for (const sentence of detected) {
    const name = (Object.keys(SPEAKS_OF) as OptionName[]).find((option) => SPEAKS_OF[option].test(sentence));
    if (name === undefined) rest.push(sentence);
    else by[name] = by[name] === "" ? sentence : `${by[name]} ${sentence}`;
  }
  return { by, rest };
}
