/**
 * From evidence to columns: one group of columns per attribute of the reference set, market movement last.
 * Rows are ordered by sold-on day, then id, so that the order in which sales were entered never changes a bit.
 * Age at sale = (sold on − built)/365.2425 years; market movement in months since the first sale of the evidence.
 */

import type { NewAssetClass } from "../domain/assetClass.ts";
import { CHANNEL_KEY, MARKET_KEY } from "../domain/attribute.ts";
import { DAYS_PER_MONTH, yearsBetween } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { ModelAttribute, PriceModel } from "../domain/priceModel.ts";
import { CHANNELS, type SaleColumns } from "../domain/sale.ts";
import { accumulateMoments } from "../numerics/accumulateMoments.ts";
import { type Column, numbersOf } from "../numerics/column.ts";
import type { AttributeGroup, Design, DesignColumn } from "./fit.ts";
import type { FormSource } from "./forms/form.ts";
import { FORMS } from "./forms/index.ts";

/** Refuses: no evidence; an attribute that the class does not have; a form that does not suit the attribute. */
export function buildDesign(
  sales: SaleColumns,
  used: Int32Array,
  assetClass: NewAssetClass,
  model: PriceModel,
): Design {
  if (used.length === 0) {
    throw new AppError({
      family: "fit",
      code: "no-evidence",
      what: "No sale is left as evidence, so no price can be worked out.",
      where: assetClass.name,
      whatToDo: "Widen the filter, put sales back, or leave out the attribute whose values are missing.",
    });
  }
  const rows = Int32Array.from(used).sort(
    (a, b) => sales.soldOn[a]! - sales.soldOn[b]! || sales.ids[a]! - sales.ids[b]!,
  );
  const prices = Float64Array.from(rows, (at) => sales.price[at]!);
  const soldOn = Float64Array.from(rows, (at) => sales.soldOn[at]!);
  const response = model.response === "lnPrice" ? prices.map((price) => Math.log(price)) : prices;
  const columns: DesignColumn[] = [];
  const groups = model.attributes.map((wanted) => addGroup(columns, sourceOf(sales, rows, assetClass, wanted), wanted));
  if (model.market === "line") groups.push(addMarket(columns, soldOn));
  return {
    n: rows.length,
    rows,
    responseForm: model.response,
    response,
    prices,
    soldOn,
    columns,
    groups,
    moments: accumulateMoments([...columns.map((column) => column.values), response]),
    weights: null,
  };
}

function sourceOf(sales: SaleColumns, rows: Int32Array, assetClass: NewAssetClass, wanted: ModelAttribute): FormSource {
  if (wanted.key === CHANNEL_KEY) {
    const stored = Float64Array.from(rows, (at) => CHANNELS.indexOf(sales.channels[at]!));
    return { label: "Sold through", attribute: null, stored, levels: CHANNELS, reference: wanted.reference };
  }
  const attribute = assetClass.attributes.find((one) => one.key === wanted.key);
  const values = sales.values[wanted.key];
  if (attribute === undefined || values === undefined) {
    throw new AppError({
      family: "fit",
      code: "unknown-attribute",
      what: `The class has no attribute called "${wanted.key}".`,
      where: assetClass.name,
      whatToDo: "Choose among the attributes of the class.",
    });
  }
  const stored = Float64Array.from(rows, (at) =>
    attribute.kind === "built" ? yearsBetween(values[at]!, sales.soldOn[at]!) : values[at]!,
  );
  refuseUnsuited(attribute.kind, attribute.label, wanted);
  return { label: attribute.label, attribute, stored, levels: attribute.levels, reference: wanted.reference };
}

function refuseUnsuited(kind: string, label: string, { form }: ModelAttribute): void {
  const suits =
    kind === "choice" ? form === "choice" : kind === "yesNo" ? form === "yesNo" : form === "line" || form === "ln";
  if (suits) return;
  throw new AppError({
    family: "fit",
    code: "unsuited-form",
    what: `${label} cannot enter the model as ${FORMS[form].label}.`,
    where: `Price model, attribute ${label}`,
    whatToDo:
      kind === "choice"
        ? "Use it as a choice."
        : kind === "yesNo"
          ? "Use it as yes or no."
          : "Use a straight line or a logarithm.",
  });
}

function addGroup(columns: DesignColumn[], source: FormSource, { key, form }: ModelAttribute): AttributeGroup {
  const made = FORMS[form].columns(source);
  const indexes = made.columns.map(({ level, values }) => {
    columns.push({ attribute: key, level, values, mean: meanOf(values) });
    return columns.length - 1;
  });
  const { unit, reference, step, stepWords } = made;
  const decimals = source.attribute?.decimals ?? 0;
  return {
    key,
    label: source.label,
    form,
    unit,
    decimals,
    step,
    stepWords,
    columns: indexes,
    reference,
    isMarket: false,
  };
}

function addMarket(columns: DesignColumn[], soldOn: Float64Array): AttributeGroup {
  const first = soldOn[0]!;
  const values = soldOn.map((day) => (day - first) / DAYS_PER_MONTH);
  columns.push({ attribute: MARKET_KEY, level: null, values, mean: meanOf(values) });
  return {
    key: MARKET_KEY,
    label: "Market movement",
    form: "line",
    unit: "months",
    decimals: 1,
    step: 12,
    stepWords: "12\u00a0months",
    columns: [columns.length - 1],
    reference: null,
    isMarket: true,
  };
}

function meanOf(column: Column): number {
  const values = numbersOf(column);
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
