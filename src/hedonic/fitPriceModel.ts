/**
 * A least-squares fit of some groups of a design, with leverages and HC3 standard errors. Column numbers become attribute
 * names here, once: what numerics refuses is said again in the words of the class.
 */
import { AppError } from "../domain/errors.ts";
import type { Column } from "../numerics/column.ts";
import { hcCovariance } from "../numerics/hcCovariance.ts";
import { leverages } from "../numerics/leverages.ts";
import { NumericsError } from "../numerics/numericsError.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../numerics/solveLeastSquares.ts";
import type { AttributeGroup, Design, Fit, FitRule } from "./fit.ts";

/** A leverage this near 1 means that a sale is the only one of its kind: HC3 divides by (1 − h)² and is not given. */
const FULL_LEVERAGE = 1 - 1e-9;

/** Least squares with the design's own weights. */
export function plainRule(design: Design): FitRule {
  return { weights: design.weights, penalty: null };
}

/** Refuses (family "fit"): too few sales for the coefficients; columns that still depend on each other. */
export function fitColumns(design: Design, groups: readonly AttributeGroup[], rule = plainRule(design)): Fit {
  const columns = groups.flatMap((group) => [...group.columns]);
  const values = columns.map((index) => design.columns[index]!.values);
  const solution = solve(design, values, columns, groups, rule);
  const h = leverages(values, solution, rule.weights);
  const robust = h.some((one) => one > FULL_LEVERAGE) ? null : hcCovariance(values, solution, "HC3", rule.weights, h);
  return {
    design,
    groups,
    columns,
    rule,
    solution,
    leverages: h,
    hc3StandardErrors: robust?.standardErrors ?? null,
    hc3InterceptStandardError: robust?.interceptStandardError ?? null,
  };
}

function solve(
  design: Design,
  values: readonly Column[],
  columns: readonly number[],
  groups: readonly AttributeGroup[],
  rule: FitRule,
): LeastSquaresSolution {
  try {
    const { weights, penalty } = rule;
    return solveLeastSquares(values, design.response, {
      intercept: true,
      ...(weights === null ? {} : { weights }),
      ...(penalty === null ? {} : { penalty: Float64Array.from(columns, (column) => penalty[column]!) }),
    });
  } catch (cause) {
    if (!(cause instanceof NumericsError)) throw cause;
    throw inWords(cause, design, columns, groups);
  }
}

export function inWords(
  cause: NumericsError,
  design: Design,
  columns: readonly number[],
  groups: readonly AttributeGroup[],
): AppError {
  const count = columns.length + 1;
  if (cause.code === "tooFewRows") {
    const sales = design.n === 1 ? "1 sale" : `${design.n} sales`;
    return new AppError({
      family: "fit",
      code: "too-few-sales",
      what: `${sales} cannot carry ${count} ${count === 1 ? "coefficient" : "coefficients"} and a range.`,
      where: "Price model",
      whatToDo: "Leave attributes out, or bring in more sales: more sales than coefficients are needed.",
      cause,
    });
  }
  const names = cause.columns.map((at) => {
    const column = design.columns[columns[at]!];
    const label = groups.find((group) => group.key === column?.attribute)?.label ?? "an attribute";
    return column?.level === null || column === undefined ? label : `${label} ${column.level}`;
  });
  return new AppError({
    family: "fit",
    code: cause.code === "rankDeficient" ? "dependent" : "not-computable",
    what:
      cause.code === "rankDeficient"
        ? `${names.join(", ")}: the other attributes already say the same, so no unique effect exists.`
        : `The fit cannot be worked out: ${cause.message}.`,
    where: "Price model",
    whatToDo: "Leave one of them out.",
    cause,
  });
}
