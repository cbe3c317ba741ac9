/** What a person can change about how a price model is fitted, each as a new model. Settings at their default are not stored. */
import type {
  Blend,
  ChoiceReading,
  ErrorRule,
  Estimator,
  ModelAttribute,
  PriceModel,
  RangeKind,
  RareLevels,
} from "../../domain/priceModel.ts";

type Setting = "halfLifeMonths" | "estimator" | "errors" | "range" | "interactions" | "blends";

function withSetting<Name extends Setting>(model: PriceModel, name: Name, value: PriceModel[Name] | null): PriceModel {
  const next: { -readonly [Key in keyof PriceModel]: PriceModel[Key] } = { ...model };
  if (value === null || value === undefined) delete next[name];
  else next[name] = value;
  return next;
}

/** Null: every sale counts alike, however old. */
export function setHalfLife(model: PriceModel, months: number | null): PriceModel {
  return withSetting(model, "halfLifeMonths", months);
}

export function setEstimator(model: PriceModel, kind: Estimator["kind"]): PriceModel {
  if (kind === "leastSquares") return withSetting(model, "estimator", null);
  return withSetting(model, "estimator", kind === "ridge" ? { kind, penalty: null } : { kind });
}

export function setErrors(model: PriceModel, errors: ErrorRule): PriceModel {
  return withSetting(model, "errors", errors.kind === "even" ? null : errors);
}

export function setRange(model: PriceModel, range: RangeKind): PriceModel {
  return withSetting(model, "range", range === "exact" ? null : range);
}

function changeAttribute(model: PriceModel, key: string, change: (one: ModelAttribute) => ModelAttribute): PriceModel {
  return { ...model, attributes: model.attributes.map((one) => (one.key === key ? change(one) : one)) };
}

/** Straight line, logarithm, or a curve through so many knots. */
export function setForm(model: PriceModel, key: string, form: "line" | "ln" | "spline", knots: number): PriceModel {
  return changeAttribute(model, key, ({ knots: _, ...one }) =>
    form === "spline" ? { ...one, form, knots } : { ...one, form },
  );
}

export function setReading(model: PriceModel, key: string, reading: ChoiceReading): PriceModel {
  return changeAttribute(model, key, ({ reading: _, ...one }) => (reading === "reference" ? one : { ...one, reading }));
}

export function setRareLevels(model: PriceModel, key: string, rare: RareLevels): PriceModel {
  return changeAttribute(model, key, ({ rare: _, ...one }) => (rare === "keep" ? one : { ...one, rare }));
}

export function addInteraction(model: PriceModel, a: string, b: string): PriceModel {
  const now = model.interactions ?? [];
  const isThere = now.some((one) => (one.a === a && one.b === b) || (one.a === b && one.b === a));
  return a === b || isThere ? model : withSetting(model, "interactions", [...now, { a, b }]);
}

export function removeInteraction(model: PriceModel, a: string, b: string): PriceModel {
  const rest = (model.interactions ?? []).filter((one) => one.a !== a || one.b !== b);
  return withSetting(model, "interactions", rest.length === 0 ? null : rest);
}

export { blendOf } from "../../domain/blendOf.ts";

/** Takes in the blend, or puts it in the place of the one with its key. */
export function putBlend(model: PriceModel, blend: Blend): PriceModel {
  const now = model.blends ?? [];
  const isThere = now.some((one) => one.key === blend.key);
  const next = isThere ? now.map((one) => (one.key === blend.key ? blend : one)) : [...now, blend];
  return withSetting(model, "blends", next);
}

export function removeBlend(model: PriceModel, key: string): PriceModel {
  const rest = (model.blends ?? []).filter((one) => one.key !== key);
  return withSetting(model, "blends", rest.length === 0 ? null : rest);
}
