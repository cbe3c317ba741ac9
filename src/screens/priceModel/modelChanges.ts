/** What a person can change about a price model, each as a new model. */
import { type Attribute, CHANNEL_KEY } from "../../domain/attribute.ts";
import { type AttributeForm, type PriceModel, usualForm } from "../../domain/priceModel.ts";
import { CHANNELS, type Channel } from "../../domain/sale.ts";

export function isInReferenceSet(model: PriceModel, key: string): boolean {
  return model.attributes.some((one) => one.key === key);
}

export function isIn(model: PriceModel, key: string): boolean {
  return isInReferenceSet(model, key) && !model.leftOut.includes(key);
}

function without(keys: readonly string[], key: string): readonly string[] {
  return keys.filter((one) => one !== key);
}

/** Leaves an attribute out or puts it back; one outside the reference set joins it. */
export function switchAttribute(model: PriceModel, key: string, kind: Attribute["kind"]): PriceModel {
  if (!isInReferenceSet(model, key)) return setReferenceMember(model, key, kind, true);
  const leftOut = model.leftOut.includes(key) ? without(model.leftOut, key) : [...model.leftOut, key];
  return { ...model, leftOut };
}

/** Takes an attribute into the reference set or out of it; out of it, its missing values cost no sale. */
export function setReferenceMember(
  model: PriceModel,
  key: string,
  kind: Attribute["kind"],
  belongs: boolean,
): PriceModel {
  const leftOut = without(model.leftOut, key);
  const others = model.attributes.filter((one) => one.key !== key);
  if (!belongs) return { ...model, attributes: others, leftOut };
  const member = { key, form: usualForm({ kind }), reference: null };
  return { ...model, attributes: [...others, member], leftOut };
}

const NEXT_FORM: Readonly<Record<AttributeForm, AttributeForm>> = {
  line: "ln",
  ln: "spline",
  spline: "line",
  choice: "choice",
  yesNo: "yesNo",
};

export function cycleForm(model: PriceModel, key: string): PriceModel {
  const attributes = model.attributes.map((one) => (one.key === key ? { ...one, form: NEXT_FORM[one.form] } : one));
  return { ...model, attributes };
}

/** Level that the others of a choice are read against; null = the most frequent. */
export function setReferenceLevel(model: PriceModel, key: string, reference: string | null): PriceModel {
  return { ...model, attributes: model.attributes.map((one) => (one.key === key ? { ...one, reference } : one)) };
}

/**
 * Resolves an exact dependency by leaving out `out`; the other `choices` come back in, unless they were left out for another
 * reason than this dependency, which only `out` and the ones it stands against share.
 */
export function resolveByLeavingOut(model: PriceModel, choices: readonly string[], out: string): PriceModel {
  const leftOut = [...model.leftOut.filter((key) => !choices.includes(key)), out];
  return { ...model, leftOut };
}

export function setChannelIn(model: PriceModel, isWanted: boolean): PriceModel {
  if (!isInReferenceSet(model, CHANNEL_KEY)) {
    if (!isWanted) return model;
    return { ...model, attributes: [{ key: CHANNEL_KEY, form: "choice", reference: null }, ...model.attributes] };
  }
  const leftOut = without(model.leftOut, CHANNEL_KEY);
  return { ...model, leftOut: isWanted ? leftOut : [...leftOut, CHANNEL_KEY] };
}

/** Sales of the channel count or not; with all of them the filter is none. At least one always counts. */
export function switchChannel(model: PriceModel, channel: Channel): PriceModel {
  const now = model.filter.channels ?? CHANNELS;
  const next = now.includes(channel)
    ? now.filter((one) => one !== channel)
    : CHANNELS.filter((one) => now.includes(one) || one === channel);
  if (next.length === 0) return model;
  return { ...model, filter: { ...model.filter, channels: next.length === CHANNELS.length ? null : next } };
}
