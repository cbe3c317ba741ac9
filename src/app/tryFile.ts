/**
 * A file of sales tried in memory: read, kinds of the named columns settled, fitted, and priced if there is a subject. Pure but
 * for what is handed in; the same bytes and wishes give the same result. Rows go the way of every import, so held-back rows
 * and duplicates are counted here as they are there.
 */
import type { Appraisal } from "../domain/appraisal.ts";
import type { AssetClass } from "../domain/assetClass.ts";
import type { Attribute } from "../domain/attribute.ts";
import type { Day } from "../domain/day.ts";
import type { DuplicateRow, HeldBackRow } from "../domain/importRecord.ts";
import {
  EVERYTHING,
  type ModelAttribute,
  type PriceModel,
  type ResponseForm,
  usualForm,
} from "../domain/priceModel.ts";
import type { Subject } from "../domain/subject.ts";
import { convertRows } from "../import/convertRows.ts";
import { indexOfSales } from "../import/duplicates.ts";
import { readSalesFile } from "../import/readSalesFile.ts";
import { columnsOfSales, type NumberedSale } from "./columnsOfSales.ts";
import { computeAppraisal } from "./computeAppraisal.ts";
import { NO_CLASS } from "./convertFile.ts";
import { attributesOfMatch, settle } from "./newAttributes.ts";
import { matchFor, refusal, type Wishes, wishesOf } from "./tryColumns.ts";
import { exactPrices, verbatim, withWholeUnits } from "./tryPrices.ts";

export interface TryRequest {
  readonly fileName: string;
  readonly bytes: Uint8Array;
  /** Headings of the file, compared without regard to case where no heading is equal. */
  readonly price: string;
  readonly attributes: readonly string[];
  readonly choices: readonly string[];
  readonly ln: readonly string[];
  readonly leaveOut: readonly string[];
  readonly response: ResponseForm;
  readonly levels: readonly number[];
  /** Stands for the day of sale where the file has none. */
  readonly today: Day;
  /** The item, once the attributes are known by key and label; null: fit only. */
  subject(attributes: readonly Attribute[]): Subject | null;
}

export interface TryOutcome {
  readonly appraisal: Appraisal;
  readonly account: {
    readonly read: number;
    readonly heldBack: readonly HeldBackRow[];
    readonly duplicates: readonly DuplicateRow[];
  };
  /** The column heading of an attribute's key. */
  nameOf(key: string): string;
  readonly detected: readonly string[];
}

function modelOf(request: TryRequest, wishes: Wishes, byHeading: ReadonlyMap<string, Attribute>): PriceModel {
  const attributes: ModelAttribute[] = wishes.attributes.map((heading) => {
    const attribute = byHeading.get(heading)!;
    if (wishes.ln.includes(heading) && attribute.kind !== "number") {
      throw refusal(
        "no-logarithm",
        `"${heading}" holds no numbers, so it can't enter by its logarithm.`,
        "--ln",
        "Leave it out of --ln.",
      );
    }
    return { key: attribute.key, form: wishes.ln.includes(heading) ? "ln" : usualForm(attribute), reference: null };
  });
  const leftOut = wishes.leaveOut.map((heading) => byHeading.get(heading)!.key);
  return { response: request.response, attributes, leftOut, market: "none", filter: EVERYTHING };
}

function classOf(fileName: string, currencyCode: string, attributes: readonly Attribute[]): AssetClass {
  return { ...NO_CLASS, name: fileName, currencyCode, attributes };
}

/** Refuses (AppError) what readSalesFile refuses, unknown columns, contradictions, and evidence that no model can be fitted on. */
export function tryFile(request: TryRequest): TryOutcome {
  const table = readSalesFile(request.bytes, request.fileName, null);
  const wishes = wishesOf(request, table);
  const { match, fresh } = attributesOfMatch(matchFor(table, wishes, request), NO_CLASS);
  const assetClass = classOf(request.fileName, match.fixed.currencyCode, fresh);
  const priceAt = table.headings.indexOf(wishes.price);
  const result = convertRows(
    withWholeUnits(table, priceAt, assetClass.currencyCode),
    match,
    assetClass,
    indexOfSales([]),
  );
  const sales: NumberedSale[] = result.accepted.map(({ row, sale }) => ({ id: row, sale }));
  const attributes = fresh.map((attribute) =>
    settle(
      attribute,
      sales.map(({ sale }) => sale),
    ),
  );
  const byHeading = new Map(attributes.map((attribute) => [attribute.label, attribute]));
  const columns = columnsOfSales(sales, attributes);
  const computed = computeAppraisal({
    assetClass: { ...assetClass, attributes },
    sales: { ...columns, price: exactPrices(table, priceAt, sales, columns) },
    model: modelOf(request, wishes, byHeading),
    subject: request.subject(attributes),
    levels: request.levels,
  });
  const labels = new Map(attributes.map(({ key, label }) => [key, label]));
  return {
    appraisal: computed.appraisal,
    account: {
      read: result.read,
      heldBack: verbatim(result.heldBack, table, priceAt),
      duplicates: verbatim(result.duplicates, table, priceAt),
    },
    nameOf: (key) => labels.get(key) ?? key,
    detected: [...table.detected, ...result.notes],
  };
}
