/**
 * Two price models side by side for one subject: coefficients, price, error, and what made the difference. The move of the price
 * is shared out over the attributes, the sales and the settings that differ, averaged over every order of changing them.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { Appraisal, EvidenceAccount } from "../domain/appraisal.ts";
import type { AssetClass } from "../domain/assetClass.ts";
import type { ComparedSale, ComparedSide, Comparison, PriceCause } from "../domain/comparison.ts";
import { dayOf } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import { formatMoney, formatPercent, listWords, lowerStart, niceStep, roundTo } from "../domain/format.ts";
import type { ModelAttribute, PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { Subject } from "../domain/subject.ts";
import { accountOf } from "../evidence/selectEvidence.ts";
import { compareCoefficients } from "../explanation/compareCoefficients.ts";
import { priceWithout, pullWeights } from "../explanation/pull.ts";
import { shareOut } from "../explanation/shareOut.ts";
import { buildDesign } from "../hedonic/buildDesign.ts";
import {
  type AppraisalInput,
  type ComputedAppraisal,
  computeAppraisal,
  type PreparedEvidence,
  prepareEvidence,
  priceOf,
} from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import { counted } from "./recordAct.ts";

type Choice = RequestInput<"compare">["first"];

interface Side {
  readonly name: string;
  readonly editionNumber: number | null;
  readonly input: AppraisalInput;
  readonly prepared: PreparedEvidence;
  readonly computed: ComputedAppraisal;
  /** Sales of the edition that are no longer in the register. */
  readonly gone: number;
}

/** Attributes that differ, singly up to this many; beyond it, or with many sales, they are taken together. */
const MOST_SINGLE = 6;
const MANY_SALES = 20_000;
const LISTED = 20;

/** Refuses: an edition that is not there; what fitting either side refuses. */
export function compareModels(ports: Ports, input: RequestInput<"compare">): RequestOutput<"compare"> {
  const assetClass = ports.store.assetClasses.get(input.classId);
  const sales = ports.store.sales.readColumns(input.classId);
  const sideOf = (choice: Choice) => sideFrom(ports, assetClass, sales, choice, input.subject, input.level);
  const [first, second] = [sideOf(input.first), sideOf(input.second)];
  const sameSales = sameRows(first.prepared.used, second.prepared.used);
  const areAlike = sameSales && sameReference(first.input.model, second.input.model);
  const causes = causesOf(first, second, sameSales);
  const sides = [comparedSide(first, input.level), comparedSide(second, input.level)] as const;
  return {
    className: assetClass.name,
    currencyCode: assetClass.currencyCode,
    subjectTitle: input.subject?.title ?? null,
    sides,
    coefficients: compareCoefficients(first.computed.appraisal, second.computed.appraisal, areAlike),
    causes,
    sales: comparedSales(first, second, sales),
    cautions: cautionsOf(first, second, areAlike),
    headline: headlineOf(sides, causes, assetClass.currencyCode),
  };
}

function sideFrom(
  ports: Ports,
  assetClass: AssetClass,
  sales: SaleColumns,
  choice: Choice,
  subject: Subject | null,
  level: number,
): Side {
  const common = { assetClass, sales, subject, levels: [...new Set([level, 0.9])].sort() };
  if ("model" in choice) {
    const input = { ...common, model: choice.model };
    const prepared = prepareEvidence(input);
    const computed = computeAppraisal(input, prepared);
    return { name: modelName(computed.appraisal), editionNumber: null, input, prepared, computed, gone: 0 };
  }
  const edition = ports.store.editions.find(choice.editionId);
  if (edition === null || edition.assetClassId !== assetClass.id) {
    throw new AppError({
      family: "request",
      code: "no-such-edition",
      what: `${assetClass.name} has no such edition.`,
      where: "Compare",
      whatToDo: "Choose one of the editions in the list.",
    });
  }
  const input = { ...common, model: edition.model };
  const ids = new Set(ports.store.editions.saleIds(edition.id));
  const used = rowsWith(sales, (at) => ids.has(sales.ids[at]!));
  const prepared = preparedOn(input, used);
  const computed = computeAppraisal(input, prepared);
  const name = `Edition ${edition.number}`;
  return { name, editionNumber: edition.number, input, prepared, computed, gone: ids.size - used.length };
}

/** "The model with nothing left out", "The model without age and hours". */
function modelName({ report }: Appraisal): string {
  const out = report.leftOut.filter(({ why }) => why === "person").map(({ label }) => lowerStart(label));
  return out.length === 0 ? "The model with nothing left out" : `The model without ${listWords(out)}`;
}

function rowsWith(sales: SaleColumns, holds: (at: number) => boolean): Int32Array {
  const rows: number[] = [];
  for (let at = 0; at < sales.count; at++) if (holds(at)) rows.push(at);
  return Int32Array.from(rows);
}

function preparedOn({ sales, assetClass, model, subject }: AppraisalInput, used: Int32Array): PreparedEvidence {
  const account: EvidenceAccount = accountOf(sales, used);
  return { account, used, design: buildDesign(sales, used, assetClass, model, subject?.effectiveOn ?? null) };
}

function sameRows(a: Int32Array, b: Int32Array): boolean {
  return a.length === b.length && a.every((row, i) => row === b[i]);
}

function sameReference(a: PriceModel, b: PriceModel): boolean {
  const plain = ({ leftOut: _, errors: _errors, range: _range, ...rest }: PriceModel) => JSON.stringify(rest);
  return plain(a) === plain(b);
}

function comparedSide({ name, editionNumber, computed }: Side, level: number): ComparedSide {
  const { report, priced } = computed.appraisal;
  const range = priced?.price.rangeForOneSale.find((one) => one.level === level) ?? null;
  const labelOf = (key: string) => report.attributeEvidence.find((one) => one.key === key)?.label ?? key;
  return {
    name,
    editionNumber,
    saleCount: report.n,
    p: report.p,
    r2: report.r2,
    looTypicalError: report.looTypicalError,
    included: report.attributes.map((key) => ({ key, label: labelOf(key) })),
    leftOut: report.leftOut.map(({ key, label }) => ({ key, label })),
    price:
      priced === null || range === null
        ? null
        : { amount: priced.price.amount, low: range.low, high: range.high, level },
  };
}

interface Change {
  readonly kind: PriceCause["kind"];
  readonly label: string;
  /** Members that this change takes from the second side. */
  readonly keys: readonly string[];
}

function causesOf(first: Side, second: Side, sameSales: boolean): PriceCause[] {
  const [from, to] = [first.computed.appraisal.priced, second.computed.appraisal.priced];
  if (from === null || to === null) return [];
  const changes = changesBetween(first, second, sameSales);
  const all = 2 ** changes.length - 1;
  const shares = shareOut(changes.length, (mask) =>
    mask === 0 ? from.price.amount : mask === all ? to.price.amount : mixedPrice(first, second, changes, mask),
  );
  return changes
    .map(({ kind, label }, at) => ({ kind, label, amount: shares[at]! }))
    .sort((a, b) => Math.abs(b.amount) - Math.abs(a.amount));
}

function changesBetween(first: Side, second: Side, sameSales: boolean): Change[] {
  const keys = [...new Set([...membersOf(first).keys(), ...membersOf(second).keys()])].filter(
    (key) => JSON.stringify(membersOf(first).get(key)) !== JSON.stringify(membersOf(second).get(key)),
  );
  const labelOf = (key: string) =>
    [first, second].flatMap((side) => side.computed.appraisal.report.attributeEvidence).find((one) => one.key === key)
      ?.label ?? key;
  const changeWords = (key: string): string => {
    const label = lowerStart(labelOf(key));
    if (!membersOf(second).has(key)) return `Leaving out ${label}`;
    return membersOf(first).has(key) ? `Another form of ${label}` : `Taking in ${label}`;
  };
  const saleCount = Math.max(first.prepared.used.length, second.prepared.used.length);
  // MM searches anew at each fit, which takes about a second.
  const isSlow = [first, second].some(({ input }) => input.model.estimator?.kind === "mm");
  const isSingle = keys.length <= (isSlow ? 1 : MOST_SINGLE) && saleCount <= MANY_SALES;
  const attributes: Change[] = isSingle
    ? keys.map((key) => ({ kind: "attribute" as const, label: changeWords(key), keys: [key] }))
    : [{ kind: "attributes" as const, label: `${keys.length} attributes together`, keys }];
  const sales: Change[] = sameSales ? [] : [{ kind: "sales", label: "Other sales", keys: [] }];
  const settings: Change[] = sameSettings(first.input.model, second.input.model)
    ? []
    : [{ kind: "settings", label: "Other settings of the fit", keys: [] }];
  return [...attributes, ...sales, ...settings];
}

/** Attributes that enter the model, with their forms. */
function membersOf({ input, computed }: Side): Map<string, ModelAttribute> {
  const inModel = new Set(computed.appraisal.report.attributes);
  return new Map(input.model.attributes.filter(({ key }) => inModel.has(key)).map((one) => [one.key, one]));
}

function settingsOf({ response, market, interactions, blends, halfLifeMonths, estimator }: PriceModel) {
  return {
    response,
    market,
    ...(interactions === undefined ? {} : { interactions }),
    ...(blends === undefined ? {} : { blends }),
    ...(halfLifeMonths === undefined ? {} : { halfLifeMonths }),
    ...(estimator === undefined ? {} : { estimator }),
  };
}

function sameSettings(a: PriceModel, b: PriceModel): boolean {
  return JSON.stringify(settingsOf(a)) === JSON.stringify(settingsOf(b));
}

/** Price with the changes of the mask made and the others not, on the sales of the side that the mask says. */
function mixedPrice(first: Side, second: Side, changes: readonly Change[], mask: number): number {
  const isMade = (at: number): boolean => ((mask >> at) & 1) === 1;
  const taken = new Set(changes.flatMap((change, at) => (isMade(at) ? change.keys : [])));
  const pick = (kind: Change["kind"]): Side =>
    changes.some((one, at) => one.kind === kind && isMade(at)) ? second : first;
  const differing = new Set(changes.flatMap(({ keys }) => keys));
  const [a, b] = [membersOf(first), membersOf(second)];
  const attributes = [...new Set([...a.keys(), ...b.keys()])].flatMap((key) => {
    const member = (differing.has(key) && taken.has(key) ? b : a).get(key);
    return member === undefined ? [] : [member];
  });
  const settings = settingsOf(pick("settings").input.model);
  const { filter } = first.input.model;
  const model: PriceModel = { ...settings, attributes, leftOut: [], filter };
  const { sales, assetClass, subject, levels } = first.input;
  const complete = pick("sales").prepared.used.filter((at) =>
    attributes.every(({ key }) => !Number.isNaN(sales.values[key]?.[at] ?? 0)),
  );
  const input = { sales, assetClass, subject, levels, model };
  return priceOf(input, preparedOn(input, complete))!;
}

function comparedSales(first: Side, second: Side, sales: SaleColumns): Comparison["sales"] {
  const [a, b] = [new Set(first.prepared.used), new Set(second.prepared.used)];
  const only = (side: Side, other: ReadonlySet<number>) => side.prepared.used.filter((row) => !other.has(row));
  const [onlyFirst, onlySecond] = [only(first, b), only(second, a)];
  const listed = [...listSales(first, onlyFirst, 1, sales), ...listSales(second, onlySecond, 2, sales)]
    .sort((x, y) => Math.abs(y.moves ?? 0) - Math.abs(x.moves ?? 0) || x.sale - y.sale)
    .slice(0, LISTED);
  return { both: a.size - onlyFirst.length, onlyFirst: onlyFirst.length, onlySecond: onlySecond.length, listed };
}

function listSales({ computed }: Side, rows: Int32Array, number: 1 | 2, sales: SaleColumns): ComparedSale[] {
  const { fit, row, appraisal } = computed;
  const { priced } = appraisal;
  const weights = row === null ? null : pullWeights(fit, row);
  const placeOf = new Map(Array.from(fit.design.rows, (at, place) => [at, place]));
  return Array.from(rows, (at) => {
    const place = placeOf.get(at)!;
    const without = weights === null || priced === null ? null : priceWithout(fit, weights, place, priced.price.fitted);
    return {
      side: number,
      sale: sales.ids[at]!,
      reference: sales.references.at(at) ?? null,
      title: sales.titles.at(at)!,
      soldOn: dayOf(sales.soldOn[at]!),
      price: sales.price[at]!,
      moves: without === null ? null : priced!.price.amount - without,
    };
  });
}

function cautionsOf(first: Side, second: Side, areAlike: boolean): string[] {
  const gone = [first, second]
    .filter((side) => side.gone > 0)
    .map(
      (side) =>
        `${side.name} rested on ${counted(side.gone, "sale")} that ${side.gone === 1 ? "is" : "are"} no longer in the register; it is fitted without.`,
    );
  const unlike = areAlike
    ? []
    : [
        "The two do not rest on the same sales, reference set and settings, so differences of coefficients cannot be split exactly.",
      ];
  return [...gone, ...unlike];
}

function headlineOf(
  [first, second]: readonly [ComparedSide, ComparedSide],
  causes: readonly PriceCause[],
  currencyCode: string,
): string {
  const errors = errorWords(first, second);
  const [from, to] = [first.price, second.price];
  if (from === null || to === null) return errors;
  const step = Math.max(1, niceStep(Math.min(from.amount, to.amount) / 1000));
  const money = (amount: number): string => formatMoney(roundTo(amount, step), currencyCode);
  const shown = causes.filter(({ amount }) => roundTo(amount, step) !== 0).slice(0, 3);
  if (shown.length === 0) return `Both price the item at ${money(from.amount)}. ${errors}`;
  const parts = shown.map(
    ({ label, amount }) => `${lowerStart(label)} ${amount < 0 ? "takes off" : "adds"} ${money(Math.abs(amount))}`,
  );
  return `${first.name} prices the item at ${money(from.amount)}, ${lowerStart(second.name)} at ${money(to.amount)}: ${listWords(parts)}. ${errors}`;
}

function errorWords(first: ComparedSide, second: ComparedSide): string {
  const [a, b] = [first.looTypicalError, second.looTypicalError];
  if (a === null || b === null) return "The error on a sale not yet seen cannot be told for both.";
  const [from, to] = [formatPercent(a, 1), formatPercent(b, 1)];
  if (from === to) return `On a sale not yet seen both are typically ${from} off.`;
  return `On a sale not yet seen they are typically ${from} and ${to} off.`;
}
