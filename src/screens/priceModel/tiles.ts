/** What each tile on the rail says: in, left out and why, and its form in words. */
import type { ModelReport } from "../../domain/appraisal.ts";
import type { AssetClass } from "../../domain/assetClass.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import { isInReferenceSet } from "./modelChanges.ts";

export type TileState = "in" | "justNow" | "person" | "exact" | "notKnown" | "outside";

export interface TileFacts {
  readonly attribute: Attribute;
  readonly state: TileState;
  /** "left out, exact" */
  readonly stateWords: string;
  readonly formWords: string;
  /** Why, as a sentence; null while it is in. */
  readonly sentence: string | null;
  /** Choices: what can be the level that the others are read against, and which is. */
  readonly reference: string | null;
  readonly chosenReference: string | null;
}

const STATE_WORDS: Readonly<Record<TileState, string>> = {
  in: "in",
  justNow: "left out just now",
  person: "left out",
  exact: "left out, exact",
  notKnown: "left out, not known",
  outside: "not in the set",
};

function stepWords({ kind, step, unit }: Attribute): string {
  if (kind === "built") return step === 1 ? "per year" : `per ${formatNumber(step)}\u00a0years`;
  const size = step === 1 ? "" : formatNumber(step, Number.isInteger(step) ? 0 : 2);
  return `per ${[size, unit ?? ""].filter((part) => part !== "").join("\u00a0") || "1"}`;
}

export function formWords(attribute: Attribute, model: PriceModel): string {
  const form = model.attributes.find((one) => one.key === attribute.key)?.form ?? null;
  if (attribute.kind === "yesNo") return "yes or no";
  if (attribute.kind === "choice") return `choice of ${attribute.levels.length}`;
  if (form === "spline") return "curve";
  return form === "ln" ? "ln, per 10\u00a0% more" : `straight line, ${stepWords(attribute)}`;
}

function stateOf(key: string, model: PriceModel, report: ModelReport | null, justNow: string | null): TileState {
  if (!isInReferenceSet(model, key)) return "outside";
  const out = report?.leftOut.find((one) => one.key === key);
  if (model.leftOut.includes(key)) return justNow === key ? "justNow" : out?.why === "exact" ? "exact" : "person";
  if (out === undefined) return "in";
  return out.why === "not-known" ? "notKnown" : out.why === "exact" ? "exact" : "person";
}

export function tilesOf(
  assetClass: AssetClass,
  model: PriceModel,
  report: ModelReport | null,
  justNow: string | null,
): TileFacts[] {
  const attributes = assetClass.attributes.filter((one) => !one.archived || isInReferenceSet(model, one.key));
  return attributes.map((attribute) => {
    const state = stateOf(attribute.key, model, report, justNow);
    const out = report?.leftOut.find((one) => one.key === attribute.key);
    const partner = report?.dependencies.find((one) => one.attributes.includes(attribute.key));
    const others =
      partner?.choices.filter((one) => one.key !== attribute.key).map((one) => lowerStart(one.label)) ?? [];
    const isExact = state === "exact" && others.length > 0;
    return {
      attribute,
      state,
      stateWords: STATE_WORDS[state],
      formWords: isExact ? `exact with ${others.join(", ")}` : formWords(attribute, model),
      sentence:
        state === "outside" ? `${attribute.label} does not belong to the reference set.` : (out?.sentence ?? null),
      reference: report?.attributeEvidence.find((one) => one.key === attribute.key)?.reference ?? null,
      chosenReference: model.attributes.find((one) => one.key === attribute.key)?.reference ?? null,
    };
  });
}
