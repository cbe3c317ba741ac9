/** One row → one sale, or all the reasons why not. */
import type { AttributeValue } from "../domain/attribute.ts";
import { type Day, dayNumber, yearsBetween } from "../domain/day.ts";
import type { ColumnMatch, HeldBackReason, ReadingOptions } from "../domain/importRecord.ts";
import type { Channel, NewSale, PriceBasis } from "../domain/sale.ts";
import { rowTitle } from "./duplicates.ts";
import type { AttributeColumn, Plan } from "./planColumns.ts";
import type { RawRow } from "./rawTable.ts";
import { builtDay, readBuilt, readDay } from "./readDay.ts";
import { isNotStated, type Reading, unread } from "./reading.ts";
import { readPrice } from "./readPrice.ts";
import { readChoice, readQuantity } from "./readValue.ts";
import { readChannel, readCurrency, readPremium, readTax, readYesNo } from "./readWord.ts";

export interface RowContext {
  readonly headings: readonly string[];
  readonly options: ReadingOptions;
  readonly plan: Plan;
  readonly fixed: ColumnMatch["fixed"];
  /** Of the class: the only currency a price can be in until there is a rate table. */
  readonly currencyCode: string;
  readonly priceBasis: PriceBasis;
  /** Raise doubts that a person may set aside, or faults only. */
  readonly doubts: boolean;
  /** "Power: hp converted to kW" → number of cells. */
  readonly convertedCells: Map<string, number>;
}

export type RowResult = { readonly sale: NewSale } | { readonly reasons: readonly HeldBackReason[] };

const SEVERAL_UNITS =
  /\b(?:[2-9]|[1-9]\d+|two|three|four|five|six)\s+(?:units|machines|items|pieces|pcs|boats|vehicles|instruments|lots)\b/i;

/** Collects reasons while a row is read. */
class RowReader {
  readonly reasons: HeldBackReason[] = [];
  readonly #cells: readonly string[];
  readonly #plan: Plan;

  constructor(raw: RawRow, plan: Plan) {
    this.#cells = raw.cells;
    this.#plan = plan;
  }

  cell(index: number): string {
    return this.#cells[index]!.trim();
  }

  hold(column: string | null, value: string | null, reason: string, suggestion: string | null = null): null {
    this.reasons.push({ column, value, reason, suggestion });
    return null;
  }

  settle<T>(reading: Reading<T>, column: string, cell: string): T | null {
    return reading.ok ? reading.value : this.hold(column, cell, reading.reason, reading.suggestion);
  }

  /** The cell of a plain target, or null where the file has no such column or the cell says nothing. */
  stated(to: keyof Plan["plain"]): { heading: string; cell: string } | null {
    const column = this.#plan.plain[to]?.[0];
    if (column === undefined) return null;
    const cell = this.cell(column.index);
    return isNotStated(cell) ? null : { heading: column.heading, cell };
  }

  /** Reads the cell of a plain target; `otherwise` where it says nothing; null (and a reason) where it cannot be read. */
  word<T>(to: keyof Plan["plain"], readCell: (cell: string) => Reading<T>, otherwise: T): T | null {
    const stated = this.stated(to);
    return stated === null ? otherwise : this.settle(readCell(stated.cell), stated.heading, stated.cell);
  }

  text(to: "title" | "notes" | "source" | "reference"): string {
    const columns = this.#plan.plain[to] ?? [];
    return columns
      .map(({ index }) => this.cell(index).replace(/\s+/g, " "))
      .filter((cell) => !isNotStated(cell))
      .join(" ");
  }
}

function readSoldOn(reader: RowReader, { plan, options, fixed }: RowContext): Day | null {
  const column = plan.plain.soldOn?.[0];
  if (column === undefined)
    return fixed.soldOn ?? reader.hold(null, null, "No day of sale: no column or fixed day for it.");
  const cell = reader.cell(column.index);
  if (isNotStated(cell)) return reader.hold(column.heading, cell, "No day of sale.");
  return reader.settle(readDay(cell, options.dateOrder), column.heading, cell);
}

function readPriceCell(reader: RowReader, context: RowContext): number | null {
  const column = context.plan.plain.price?.[0];
  if (column === undefined) return reader.hold(null, null, "No price: no column is matched to it.");
  const cell = reader.cell(column.index);
  if (isNotStated(cell)) return reader.hold(column.heading, cell, "No price.");
  const currencyBeside = (code: string) => otherCurrency(code, context.currencyCode);
  const expected = context.currencyCode;
  return reader.settle(readPrice(cell, context.options, expected, currencyBeside), column.heading, cell);
}

function otherCurrency(code: string, wanted: string): string | null {
  return code === wanted ? null : `No rate table yet: enter the price in ${wanted}.`;
}

function readCurrencyCell(reader: RowReader, { currencyCode, fixed }: RowContext): void {
  const stated = reader.stated("currency");
  const code =
    stated === null
      ? fixed.currencyCode
      : reader.settle(readCurrency(stated.cell, currencyCode), stated.heading, stated.cell);
  const fault = code === null ? null : otherCurrency(code, currencyCode);
  if (fault !== null) reader.hold(stated?.heading ?? null, stated?.cell ?? code, fault);
}

function outsideRange(value: number, { attribute }: AttributeColumn): string | null {
  const unit = attribute.kind === "built" ? " years old" : attribute.unit === null ? "" : ` ${attribute.unit}`;
  const { lowest, highest } = attribute;
  if (lowest !== null && value < lowest)
    return `Below the lowest allowed value, ${lowest.toLocaleString("en-GB")}${unit}.`;
  if (highest !== null && value > highest)
    return `Above the highest allowed value, ${highest.toLocaleString("en-GB")}${unit}.`;
  return null;
}

function readBuiltCell(
  cell: string,
  column: AttributeColumn,
  soldOn: Day | null,
  options: ReadingOptions,
): Reading<Day> {
  const span = readBuilt(cell, options.dateOrder);
  if (!span.ok) return span;
  const day = builtDay(span.value, soldOn);
  if (soldOn === null) return { ok: true, value: day };
  if (span.value.first > soldOn) return unread("Built later than sold.");
  const fault = outsideRange(yearsBetween(dayNumber(day)!, dayNumber(soldOn)!), column);
  return fault === null ? { ok: true, value: day } : unread(fault);
}

function readAttribute(
  reader: RowReader,
  column: AttributeColumn,
  cell: string,
  soldOn: Day | null,
  context: RowContext,
): AttributeValue {
  const { kind } = column.attribute;
  if (kind === "choice") {
    const known = column.levels.get(cell.toLowerCase());
    if (known !== undefined) return known;
    return isNotStated(cell) ? null : reader.settle(readChoice(cell, column), column.heading, cell);
  }
  if (isNotStated(cell)) return null;
  if (kind === "yesNo") return reader.settle(readYesNo(cell), column.heading, cell);
  if (kind === "built")
    return reader.settle(readBuiltCell(cell, column, soldOn, context.options), column.heading, cell);
  const value = reader.settle(readQuantity(cell, column, context), column.heading, cell);
  const fault = value === null ? null : outsideRange(value, column);
  return fault === null ? value : reader.hold(column.heading, cell, fault);
}

function readTitle(reader: RowReader, { plan }: RowContext, row: number): string {
  const title = reader.text("title");
  if (title === "") return reader.text("reference") || rowTitle(row);
  const maker = plan.makerIndex === null ? "" : reader.cell(plan.makerIndex);
  return isNotStated(maker) || title.toLowerCase().includes(maker.toLowerCase()) ? title : `${maker} ${title}`;
}

function severalUnits(reader: RowReader, plan: Plan): void {
  for (const to of ["reference", "title", "notes"] as const) {
    for (const { index, heading } of plan.plain[to] ?? []) {
      const found = SEVERAL_UNITS.exec(reader.cell(index));
      if (found !== null)
        reader.hold(heading, reader.cell(index), `${found[0]} under one price: which share is this one\u2019s?`);
    }
  }
}

function ragged(raw: RawRow, headings: readonly string[]): string | null {
  const [has, wants] = [raw.cells.length, headings.length];
  if (has === wants) return null;
  const which = has < wants ? "nothing tells which ones are missing" : "nothing tells which ones are too many";
  return `The row has ${has} cells and the heading ${wants}: ${which}.`;
}

export function convertRow(raw: RawRow, context: RowContext): RowResult {
  const { plan, fixed, headings } = context;
  const fault = raw.fault ?? ragged(raw, headings);
  if (fault !== null) return { reasons: [{ column: null, value: null, reason: fault, suggestion: null }] };
  const reader = new RowReader(raw, plan);
  const soldOn = readSoldOn(reader, context);
  const priceMinor = readPriceCell(reader, context);
  readCurrencyCell(reader, context);
  const channel = reader.word<Channel>("channel", readChannel, fixed.channel);
  const premium = reader.word("premium", readPremium, fixed.priceBasis.premium);
  const tax = reader.word("tax", readTax, fixed.priceBasis.tax);
  const values: Record<string, AttributeValue> = {};
  for (const column of plan.attributes) {
    values[column.attribute.key] = readAttribute(reader, column, reader.cell(column.index), soldOn, context);
  }
  if (context.doubts) severalUnits(reader, plan);
  const missing = soldOn === null || priceMinor === null || channel === null || premium === null || tax === null;
  if (missing || reader.reasons.length > 0) return { reasons: reader.reasons };
  return {
    sale: {
      reference: reader.text("reference") || null,
      title: readTitle(reader, context, raw.row),
      soldOn,
      priceMinor,
      currencyCode: context.currencyCode,
      priceBasis: { premium, tax },
      channel,
      source: reader.text("source") || fixed.source,
      notes: reader.text("notes"),
      values,
    },
  };
}
