/** What the register shows: an empty filter, what is set in one, and each part of it in words. */

import type { Attribute } from "../../domain/attribute.ts";
import { formatDay, formatNumber, listWords, lowerStart } from "../../domain/format.ts";
import { CHANNELS } from "../../domain/sale.ts";
import type { SalesFilter } from "./pageBook.ts";

export type ValueFilter = SalesFilter["values"][string];

export const NO_FILTER: SalesFilter = {
  search: "",
  soldFrom: null,
  soldTo: null,
  channels: null,
  state: "any",
  verified: "any",
  batchId: null,
  values: {},
};

export const NO_VALUE_FILTER: ValueFilter = { low: null, high: null, levels: null, missing: null };

export function isFiltered(filter: SalesFilter): boolean {
  return JSON.stringify({ ...filter, search: "" }) !== JSON.stringify(NO_FILTER);
}

/** The filter with one attribute's part replaced; an empty part goes. */
export function withValue(filter: SalesFilter, key: string, change: Partial<ValueFilter>): SalesFilter {
  const part = { ...(filter.values[key] ?? NO_VALUE_FILTER), ...change };
  const { [key]: _gone, ...others } = filter.values;
  const isEmpty = part.low === null && part.high === null && part.levels === null && part.missing === null;
  return { ...filter, values: isEmpty ? others : { ...others, [key]: part } };
}

export function soldWords({ soldFrom, soldTo }: SalesFilter): string {
  if (soldFrom === null && soldTo === null) return "at any time";
  if (soldFrom === null) return `until ${formatDay(soldTo!)}`;
  if (soldTo === null) return `from ${formatDay(soldFrom)}`;
  return `${formatDay(soldFrom)} – ${formatDay(soldTo)}`;
}

export function channelWords({ channels }: SalesFilter): string {
  if (channels === null) return "all, asking too";
  if (channels.length === 0) return "none";
  const isAllButAsking = channels.length === CHANNELS.length - 1 && !channels.includes("asking");
  return isAllButAsking ? "all but asking" : listWords(channels);
}

export function stateWords({ state, verified }: SalesFilter): string {
  const parts = [
    state === "any" ? null : state === "in" ? "not set aside" : "set aside",
    verified === "any" ? null : verified === "yes" ? "verified" : "not verified",
  ].filter((part) => part !== null);
  return parts.length === 0 ? "any" : parts.join(", ");
}

/** "hours from 1,000 to 4,000", "make Quern or Orveld", "hours not known" */
export function valueWords(attribute: Attribute, part: ValueFilter): string {
  const label = lowerStart(attribute.label);
  const number = (value: number): string => formatNumber(value, attribute.decimals);
  if (part.missing === true && part.low === null && part.high === null && part.levels === null) {
    return `${label} not known`;
  }
  if (part.levels !== null) return `${label} ${part.levels.length === 0 ? "none" : part.levels.join(" or ")}`;
  const low = part.low === null ? "" : ` from ${number(part.low)}`;
  const high = part.high === null ? "" : ` to ${number(part.high)}`;
  return `${label}${low}${high}`;
}
