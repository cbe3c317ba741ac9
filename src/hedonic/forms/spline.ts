/**
 * Curve: a natural cubic spline, straight beyond its outer knots (numerics/naturalSpline.ts). One column per stretch between
 * knots, whose coefficient is what the price gains over that stretch.
 */
import { AppError } from "../../domain/errors.ts";
import { formatNumber } from "../../domain/format.ts";
import { naturalSpline, splineColumns, splineKnots } from "../../numerics/naturalSpline.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import { type AttributeFormRule, type FormSource, PLAIN } from "./form.ts";

export const USUAL_KNOTS = 4;

export const spline: AttributeFormRule = {
  label: "curve",
  columns(source) {
    const { attribute, stored } = source;
    const knots = knotsOf(source);
    const at = naturalSpline(knots);
    const columns = splineColumns(at, stored, knots.length - 1);
    const unit = attribute?.kind === "built" ? (attribute.unit ?? "years") : (attribute?.unit ?? null);
    const words = (from: number, to: number) => stretchWords(from, to, unit, attribute?.decimals ?? 0);
    return {
      ...PLAIN,
      columns: knots.slice(1).map((to, j) => ({
        level: words(knots[j]!, to),
        values: columns[j]!,
      })),
      reference: null,
      step: 1,
      stepWords: null,
      unit,
      knots,
      numbersAt: (value) => at(Number(value)),
    };
  },
};

/** "2,000 to 5,000 h"; more decimals where the ends would read alike. */
export function stretchWords(from: number, to: number, unit: string | null, decimals: number): string {
  const isTold = formatNumber(from, decimals) !== formatNumber(to, decimals);
  const shown = (value: number) => formatNumber(value, isTold ? decimals : decimals + 2);
  return `${shown(from)} to ${shown(to)}${unit === null ? "" : `\u00a0${unit}`}`;
}

function knotsOf({ label, stored, wanted }: FormSource): number[] {
  const count = wanted.knots ?? USUAL_KNOTS;
  try {
    return splineKnots(stored, count);
  } catch (cause) {
    if (!(cause instanceof NumericsError)) throw cause;
    throw new AppError({
      family: "fit",
      code: "too-few-values",
      what: `${label} cannot be a curve with ${count} knots: too many of its ${formatNumber(stored.length)} values are alike (${cause.message}).`,
      where: `Price model, attribute ${label}`,
      whatToDo: "Use fewer knots, or a straight line.",
      cause,
    });
  }
}
