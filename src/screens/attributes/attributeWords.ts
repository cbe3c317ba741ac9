/** An attribute's definition in the words of its table. */
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { formatNumber } from "../../domain/format.ts";

export function kindWords({ kind, unit, levels }: Attribute): string {
  if (kind === "built") return "age at sale, in years";
  if (kind === "yesNo") return "yes or no";
  if (kind === "choice") return `choice of ${formatNumber(levels.length)}`;
  return unit === null ? "number" : `number, ${unit}`;
}

/** "1,000 h": what one more is, in ledgers and sentences. */
export function stepWords({ kind, unit, step, decimals }: Attribute): string {
  if (kind === "choice" || kind === "yesNo") return "";
  const places = Math.max(Number.isInteger(step) ? 0 : 1, Number.isInteger(step) ? 0 : decimals);
  const word = kind === "built" ? (step === 1 ? "year" : "years") : (unit ?? "");
  return `${formatNumber(step, places)}\u00a0${word}`.trim();
}

export function allowedWords({ kind, lowest, highest, decimals }: Attribute): string {
  if (kind === "choice" || kind === "yesNo") return "";
  const number = (value: number): string => formatNumber(value, Number.isInteger(value) ? 0 : decimals);
  if (lowest === null && highest === null) return "any";
  if (lowest === null) return `up to ${number(highest!)}`;
  if (highest === null) return `from ${number(lowest)}`;
  return `${number(lowest)}–${number(highest)}`;
}

export function directionWords({ expectedDirection }: Attribute): string {
  if (expectedDirection === null) return "";
  return expectedDirection === "up" ? "▲ rises with it" : "▼ falls with it";
}

/** "full 205, part 189, none 203", the commonest first and no more than four. */
export function levelWords({ levels }: Pick<AttributeEvidence, "levels">): string {
  const sorted = [...levels].sort((a, b) => b.count - a.count);
  const rest = sorted.length > 4 ? `, ${formatNumber(sorted.length - 4)} more` : "";
  return (
    sorted
      .slice(0, 4)
      .map(({ level, count }) => `${level}\u00a0${formatNumber(count)}`)
      .join(", ") + rest
  );
}

/** Whether the price goes the expected way in the model at hand; null where nothing is expected or it is not in the model. */
export function againstExpectation(
  attribute: Attribute,
  coefficients: readonly { attribute: string; estimate: number }[],
): boolean | null {
  if (attribute.expectedDirection === null) return null;
  const found = coefficients.filter((one) => one.attribute === attribute.key);
  if (found.length !== 1) return null;
  return found[0]!.estimate > 0 !== (attribute.expectedDirection === "up");
}
