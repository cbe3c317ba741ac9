/** The subject's own value of a number attribute, in the attribute's unit; age in years for a built day. */
import { dayNumber, yearsBetween } from "../domain/day.ts";
import type { Subject } from "../domain/subject.ts";
import type { AttributeGroup } from "../hedonic/fit.ts";

/** A known value, already read without refusal by describeSubject. */
export function rawValue(group: AttributeGroup, subject: Subject): number {
  const value = subject.values[group.key];
  const built = typeof value === "string" ? dayNumber(value) : null;
  return built === null ? Number(value) : yearsBetween(built, dayNumber(subject.effectiveOn)!);
}
