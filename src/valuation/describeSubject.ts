/** The subject on the design's columns, through the same forms as the sales. NaN where a value is not known. */
import type { NewAssetClass } from "../domain/assetClass.ts";
import { type AttributeValue, CHANNEL_KEY } from "../domain/attribute.ts";
import { DAYS_PER_MONTH, dayNumber, dayOf, yearsBetween } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { Subject } from "../domain/subject.ts";
import type { AttributeGroup, Design, SubjectRow } from "../hedonic/fit.ts";
import { FORMS } from "../hedonic/forms/index.ts";

/**
 * Market movement is held at the last sale of the evidence when the effective date lies after it.
 * Refuses: a value of the wrong kind, a level that no sale of the evidence has, a value without a logarithm.
 */
export function describeSubject(design: Design, assetClass: NewAssetClass, subject: Subject): SubjectRow {
  const x = new Float64Array(design.columns.length).fill(Number.NaN);
  const notKnown: string[] = [];
  for (const group of design.groups) {
    const numbers = group.isMarket ? [marketMonths(design, subject)] : numbersOf(design, assetClass, group, subject);
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

function marketMonths(design: Design, subject: Subject): number {
  const last = design.soldOn[design.n - 1]!;
  return (Math.min(dayNumber(subject.effectiveOn) ?? last, last) - design.soldOn[0]!) / DAYS_PER_MONTH;
}

function numbersOf(
  design: Design,
  assetClass: NewAssetClass,
  group: AttributeGroup,
  subject: Subject,
): number[] | null {
  const value = subject.values[group.key] ?? null;
  if (value === null || value === "") return null;
  const made = {
    columns: group.columns.map((index) => design.columns[index]!),
    reference: group.reference,
    step: group.step,
    stepWords: group.stepWords,
    unit: group.unit,
  };
  const read = readValue(assetClass, group, value, subject);
  if (group.form === "choice") refuseUnseen(design, group, String(read));
  const numbers = FORMS[group.form].subject(read, made);
  if (numbers.every(Number.isFinite)) return numbers;
  throw refusal(group.label, `${group.label} of ${value} has no logarithm.`, "Enter a value above zero.");
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
  const seen = [group.reference, ...group.columns.map((index) => design.columns[index]!.level)];
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
