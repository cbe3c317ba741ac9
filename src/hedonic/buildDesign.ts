/**
 * From evidence to columns: one group of columns per attribute of the reference set, blends in place of their members, products
 * of chosen pairs, market movement last.
 * Rows are ordered by sold-on day, then id, so that the order in which sales were entered never changes a bit.
 * Age at sale = (sold on − built)/365.2425 years. Recency weights: ½^(months before the effective date/half-life).
 */
import type { NewAssetClass } from "../domain/assetClass.ts";
import { CHANNEL_KEY, MARKET_KEY } from "../domain/attribute.ts";
import { type Day, yearsBetween } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { ModelAttribute, PriceModel } from "../domain/priceModel.ts";
import { CHANNELS, type SaleColumns } from "../domain/sale.ts";
import { accumulateMoments } from "../numerics/accumulateMoments.ts";
import { type Column, isIndicator } from "../numerics/column.ts";
import { doubles, sharedColumns, sharedNumbers } from "../numerics/sharedMemory.ts";
import { type BlendMember, blendColumn, checkBlends } from "./blends.ts";
import type { AttributeGroup, Design, DesignColumn } from "./fit.ts";
import type { FormSource } from "./forms/form.ts";
import { FORMS } from "./forms/index.ts";
import { marketColumns } from "./market.ts";
import { productColumns } from "./products.ts";
import { recencyWeights } from "./recency.ts";

/**
 * `effectiveOn`: the day the price speaks of, which recency counts from; the last sale without one.
 * Refuses: no evidence; an attribute that the class does not have; a form that does not suit the attribute; what forms refuse.
 */
export function buildDesign(
  sales: SaleColumns,
  used: Int32Array,
  assetClass: NewAssetClass,
  model: PriceModel,
  effectiveOn: Day | null = null,
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
  const prices = picked(rows, (at) => sales.price[at]!);
  const soldOn = picked(rows, (at) => sales.soldOn[at]!);
  const response = model.response === "lnPrice" ? sharedNumbers(prices.map((price) => Math.log(price))) : prices;
  const built: Built = { columns: [], groups: [], notes: [] };
  const sources = model.attributes.map((wanted) => sourceOf(sales, rows, assetClass, wanted));
  addAttributes(built, sources, model);
  addProducts(built, model);
  addMarket(built, model, soldOn);
  const recency = recencyWeights(model.halfLifeMonths ?? null, soldOn, effectiveOn);
  const weights = recency === null ? null : sharedNumbers(recency.weights);
  if (recency !== null) built.notes.push(recency.note);
  const all = [...built.columns.map((column) => column.values), response];
  return {
    n: rows.length,
    rows,
    responseForm: model.response,
    response,
    prices,
    soldOn,
    columns: built.columns,
    groups: built.groups,
    moments: accumulateMoments(all, weights === null ? {} : { weights }),
    weights,
    notes: built.notes,
  };
}

/** One number per row, by a plain loop: a million calls through an iterator would take seconds. */
function picked(rows: Int32Array, numberAt: (at: number) => number): Float64Array {
  const numbers = doubles(rows.length);
  for (let i = 0; i < rows.length; i++) numbers[i] = numberAt(rows[i]!);
  return numbers;
}

interface Built {
  readonly columns: DesignColumn[];
  readonly groups: AttributeGroup[];
  readonly notes: string[];
}

function sourceOf(sales: SaleColumns, rows: Int32Array, assetClass: NewAssetClass, wanted: ModelAttribute): FormSource {
  if (wanted.key === CHANNEL_KEY) {
    const stored = picked(rows, (at) => CHANNELS.indexOf(sales.channels.at(at)!));
    return { label: "Sold through", attribute: null, stored, levels: CHANNELS, wanted };
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
  const isBuilt = attribute.kind === "built";
  const stored = picked(rows, (at) => (isBuilt ? yearsBetween(values[at]!, sales.soldOn[at]!) : values[at]!));
  refuseUnsuited(attribute.kind, attribute.label, wanted);
  return { label: attribute.label, attribute, stored, levels: attribute.levels, wanted };
}

function refuseUnsuited(kind: string, label: string, { form }: ModelAttribute): void {
  const suits =
    kind === "choice"
      ? form === "choice"
      : kind === "yesNo"
        ? form === "yesNo"
        : form === "line" || form === "ln" || form === "spline";
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
          : "Use a straight line, a logarithm or a curve.",
  });
}

/** Each attribute in the model's order; a blend where its first member stands. */
function addAttributes(built: Built, sources: readonly FormSource[], model: PriceModel): void {
  const blends = model.blends ?? [];
  const isNumber = ({ attribute }: FormSource): boolean => attribute?.kind === "number" || attribute?.kind === "built";
  const numbers = new Set(sources.filter(isNumber).map(({ wanted }) => wanted.key));
  checkBlends(blends, numbers, (key) => sources.find(({ wanted }) => wanted.key === key)?.label ?? key);
  const added = new Set<string>();
  for (const source of sources) {
    const blend = blends.find(({ members }) => members.some(({ key }) => key === source.wanted.key));
    if (blend === undefined) {
      addAttribute(built, source);
      continue;
    }
    if (added.has(blend.key)) continue;
    added.add(blend.key);
    const members = sources
      .filter(({ wanted }) => blend.members.some(({ key }) => key === wanted.key))
      .map(({ wanted, label, stored }): BlendMember => ({ key: wanted.key, label, stored }));
    const { values, at } = blendColumn(blend, members);
    push(built, blend.key, [{ level: null, values }], {
      ...PLAIN_GROUP,
      key: blend.key,
      label: blend.label,
      form: "line",
      unit: null,
      decimals: 2,
      step: 1,
      stepWords: "1 standard deviation",
      stored: values,
      numbersAt: () => [],
      blend: { members: members.map(({ key }) => key), at },
    });
  }
}

const PLAIN_GROUP = {
  reference: null,
  isMarket: false,
  knots: [],
  merged: null,
  reading: "reference",
  product: null,
  blend: null,
} as const;

function addAttribute(built: Built, source: FormSource): void {
  const { key, form, reading } = source.wanted;
  const made = FORMS[form].columns(source);
  built.notes.push(...made.notes);
  push(built, key, made.columns, {
    ...PLAIN_GROUP,
    key,
    label: source.label,
    form,
    unit: made.unit,
    decimals: source.attribute?.decimals ?? 0,
    step: made.step,
    stepWords: made.stepWords,
    reference: made.reference,
    stored: form === "choice" || form === "yesNo" ? null : source.stored,
    numbersAt: made.numbersAt,
    knots: made.knots,
    merged: made.merged,
    reading: reading ?? "reference",
  });
}

function push(
  built: Built,
  attribute: string,
  columns: readonly Pick<DesignColumn, "level" | "values">[],
  group: Omit<AttributeGroup, "columns">,
): void {
  const shared = sharedColumns(columns.map(({ values }) => values));
  const indexes = columns.map(({ level }, at) => {
    const values = shared[at]!;
    built.columns.push({ attribute, level, values, mean: meanOf(values) });
    return built.columns.length - 1;
  });
  built.groups.push({ ...group, columns: indexes });
}

/** Pairs of which both stand in the design; of the others nothing enters. */
function addProducts(built: Built, { interactions = [] }: PriceModel): void {
  const entered = new Set<string>();
  for (const pair of interactions) {
    const [a, b] = [pair.a, pair.b].map((key) => built.groups.find((group) => group.key === key));
    if (a === undefined || b === undefined || a.product !== null || b.product !== null) {
      const names = `${a?.label ?? pair.a} and ${b?.label ?? pair.b}`;
      built.notes.push(
        `The product of ${names} is left out: both must be attributes of the set that stand for themselves.`,
      );
      continue;
    }
    const name = [pair.a, pair.b].sort().join("*");
    if (a === b || entered.has(name)) {
      built.notes.push(
        `The product of ${a.label} and ${b.label} is left out: ${a === b ? "an attribute with itself is a matter of its form" : "it is in already"}.`,
      );
      continue;
    }
    entered.add(name);
    const { columns, group } = productColumns(a, b, built.columns);
    push(built, group.key, columns, group);
  }
}

function addMarket(built: Built, { market }: PriceModel, soldOn: Float64Array): void {
  const made = marketColumns(market, soldOn);
  if (made === null) return;
  built.notes.push(...made.notes);
  push(built, MARKET_KEY, made.columns, made.group);
}

function meanOf(column: Column): number {
  if (!isIndicator(column)) return column.reduce((sum, value) => sum + value, 0) / column.length;
  let count = 0;
  for (let i = 0; i < column.length; i++) if (column.codes[i] === column.level) count += 1;
  return count / column.length;
}
