/** The subject on the design's columns, through the same forms as the sales. NaN where a value is not known. */
import type { NewAssetClass } from "../domain/assetClass.ts";
import { type AttributeValue, CHANNEL_KEY } from "../domain/attribute.ts";
import { dayNumber, dayOf, yearsBetween } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { Subject } from "../domain/subject.ts";
import type { AttributeGroup, Design, SubjectRow } from "../hedonic/fit.ts";

/**
 * Market movement is held at the last sale of the evidence when the effective date lies after it.
 * Refuses: a value of the wrong kind, a level that no sale of the evidence has, a value without a logarithm.
 */
export function describeSubject(design: Design, assetClass: NewAssetClass, subject: Subject): SubjectRow {
  const x = new Float64Array(design.columns.length).fill(Number.NaN);
  const notKnown: string[] = [];
  for (const group of design.groups) {
    const numbers = numbersOf(design, assetClass, group, subject, x);
    if (numbers === null) notKnown.push(group.key);
    else
      group.columns.forEach((index, at) => {
        x[index] = numbers[at]!;
      });
  }
  return { x, notKnown };
}

/** The day at which the market movement is held, or null when the effective date is covered by the evidence. */
export function marketHeldAt(design: Design, subject: Subject): string | null {
  const last = design.soldOn[design.n - 1]!;
  const isInModel = design.groups.some((group) => group.isMarket);
  return isInModel && (dayNumber(subject.effectiveOn) ?? last) > last ? dayOf(last) : null;
}

/** Held at the last sale of the evidence. */
function marketDay(design: Design, subject: Subject): number {
  const last = design.soldOn[design.n - 1]!;
  return Math.min(dayNumber(subject.effectiveOn) ?? last, last);
}

/** Null where a value is not known. `x` has the columns of the groups before: a product reads its members there. */
function numbersOf(
  design: Design,
  assetClass: NewAssetClass,
  group: AttributeGroup,
  subject: Subject,
  x: Float64Array,
): number[] | null {
  if (group.isMarket) return group.numbersAt(marketDay(design, subject));
  if (group.product !== null) return productNumbers(design, group.product, x);
  if (group.blend !== null) return blendNumbers(assetClass, group, group.blend, subject);
  const value = subject.values[group.key] ?? null;
  if (value === null || value === "") return null;
  const read = readValue(assetClass, group, value, subject);
  if (group.form === "choice") refuseUnseen(design, group, String(read));
  const numbers = group.numbersAt(read);
  if (numbers.every(Number.isFinite)) return numbers;
  throw refusal(group.label, `${group.label} of ${value} has no logarithm.`, "Enter a value above zero.");
}

/** In the order of productColumns: columns of a in turn, each times every column of b, both less their means. */
function productNumbers(
  { groups, columns }: Design,
  product: NonNullable<AttributeGroup["product"]>,
  x: Float64Array,
): number[] | null {
  const offsets = [product.a, product.b].map((key) =>
    groups.find((one) => one.key === key)!.columns.map((index) => x[index]! - columns[index]!.mean),
  );
  const numbers = offsets[0]!.flatMap((first) => offsets[1]!.map((second) => first * second));
  return numbers.some(Number.isNaN) ? null : numbers;
}

function blendNumbers(
  assetClass: NewAssetClass,
  group: AttributeGroup,
  blend: NonNullable<AttributeGroup["blend"]>,
  subject: Subject,
): number[] | null {
  const values = new Map<string, number>();
  for (const key of blend.members) {
    const value = subject.values[key] ?? null;
    if (value === null || value === "") return null;
    values.set(key, Number(readValue(assetClass, { ...group, key }, value, subject)));
  }
  return [blend.at(values)];
}

function readValue(
  assetClass: NewAssetClass,
  group: AttributeGroup,
  value: Exclude<AttributeValue, null>,
  subject: Subject,
): number | string | boolean {
  const attribute = assetClass.attributes.find((one) => one.key === group.key);
  if (attribute?.kind === "built") {
    const built = dayNumber(String(value));
    const effective = dayNumber(subject.effectiveOn);
    if (built === null || effective === null) {
      throw refusal(group.label, `"${value}" is no day.`, "Enter the built day as year-month-day, such as 2018-03-01.");
    }
    if (built > effective) {
      throw refusal(
        group.label,
        `The item is built after the effective date.`,
        "Check the built day and the effective date.",
      );
    }
    return yearsBetween(built, effective);
  }
  if (group.key === CHANNEL_KEY || attribute?.kind === "choice") return String(value);
  if (attribute?.kind === "yesNo") return readYesNo(group.label, value);
  const number = typeof value === "number" ? value : Number(value);
  if (Number.isFinite(number) && typeof value !== "boolean") return number;
  throw refusal(
    group.label,
    `"${value}" is no number.`,
    `Enter ${group.label} as a number${group.unit === null ? "" : ` in ${group.unit}`}.`,
  );
}

function readYesNo(label: string, value: Exclude<AttributeValue, null>): boolean {
  if (typeof value === "boolean") return value;
  const word = String(value).toLowerCase();
  if (word === "yes" || word === "true" || word === "1") return true;
  if (word === "no" || word === "false" || word === "0") return false;
  throw refusal(label, `"${value}" is neither yes nor no.`, "Enter yes or no, or mark it not known.");
}

function refuseUnseen(design: Design, group: AttributeGroup, level: string): void {
  const own = group.columns.map((index) => design.columns[index]!.level);
  // Levels that are drawn together have a mean, which stands for a level not seen.
  if (group.reference === null) return;
  const seen = [group.reference, ...own].flatMap<string | null>((one) =>
    one === group.merged?.name ? group.merged.levels : [one],
  );
  if (seen.includes(level)) return;
  throw refusal(
    group.label,
    `No sale of the evidence has ${group.label} "${level}"; seen are ${seen.filter((one) => one !== null).join(", ")}.`,
    "Choose one of these, mark it not known, or bring in sales of that kind.",
  );
}

function refusal(label: string, what: string, whatToDo: string): AppError {
  return new AppError({ family: "fit", code: "subject-value", what, where: `Subject, ${label}`, whatToDo });
}
