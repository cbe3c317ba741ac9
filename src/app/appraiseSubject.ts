/** The model a class is looked at with, and the appraisal that every change of model or subject asks for. Reads only. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { AssetClass } from "../domain/assetClass.ts";
import { CHANNEL_KEY } from "../domain/attribute.ts";
import { EVERYTHING, type PriceModel, usualForm } from "../domain/priceModel.ts";
import { type SaleColumns, textsOf } from "../domain/sale.ts";
import { computeAppraisal } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

export function currentModel(ports: Ports, { classId }: RequestInput<"currentModel">): RequestOutput<"currentModel"> {
  const edition = ports.store.editions.latest(classId);
  if (edition !== null) return { model: edition.model, edition };
  const assetClass = ports.store.assetClasses.get(classId);
  return { model: usualModel(assetClass, ports.store.sales.readColumns(classId)), edition: null };
}

/** An attribute known in a smaller share of the sales than this would cost too much evidence to start with. */
const KNOWN_SHARE = 0.5;

/**
 * The model to start from: every attribute in its usual form, ln price when all prices are positive, asking prices out
 * when there are sold ones, the channel in when more than one is left, market movement when sales span half a year.
 * Attributes known in under half of the sales stay out of the reference set.
 */
export function usualModel(assetClass: AssetClass, sales: SaleColumns): PriceModel {
  const isKnownEnough = (key: string) => {
    const values = sales.values[key] ?? new Float64Array(0);
    return values.reduce((count, value) => count + (Number.isNaN(value) ? 0 : 1), 0) >= KNOWN_SHARE * sales.count;
  };
  const attributes = assetClass.attributes
    .filter((attribute) => !attribute.archived && isKnownEnough(attribute.key))
    .map((attribute) => ({ key: attribute.key, form: usualForm(attribute), reference: null }));
  const seen = [...new Set(textsOf(sales.channels))];
  const sold = seen.filter((channel) => channel !== "asking");
  const channels = sold.length > 0 && seen.includes("asking") ? sold : null;
  const first = sales.soldOn.reduce((low, day) => Math.min(low, day), Number.POSITIVE_INFINITY);
  const last = sales.soldOn.reduce((high, day) => Math.max(high, day), Number.NEGATIVE_INFINITY);
  return {
    response: sales.price.every((price) => price > 0) ? "lnPrice" : "price",
    attributes: sold.length > 1 ? [{ key: CHANNEL_KEY, form: "choice", reference: null }, ...attributes] : attributes,
    leftOut: [],
    market: last - first > 182 ? "line" : "none",
    filter: { ...EVERYTHING, channels },
  };
}

export function appraise(
  ports: Ports,
  memory: EvidenceMemory,
  input: RequestInput<"appraise">,
): RequestOutput<"appraise"> {
  const began = performance.now();
  const assetClass = ports.store.assetClasses.get(input.classId);
  const { model, subject, levels } = input;
  const question = { assetClass, model, subject, levels };
  const { sales, prepared } = memory.recall(assetClass, question, () => ports.store.sales.readColumns(input.classId));
  const { appraisal } = computeAppraisal({ ...question, sales }, prepared);
  return { appraisal, dataVersion: assetClass.dataVersion, milliseconds: performance.now() - began };
}
