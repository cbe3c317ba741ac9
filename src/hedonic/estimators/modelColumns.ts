/** The columns of some groups as numerics wants them, and its refusals in the words of the class. */
import { AppError } from "../../domain/errors.ts";
import type { Column } from "../../numerics/column.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import type { AttributeGroup, Design, FitRule } from "../fit.ts";
import { inWords } from "../fitPriceModel.ts";

export interface ModelColumns {
  /** Design column indexes, k. */
  readonly indexes: number[];
  readonly values: Column[];
  /** k, raw units; null = none. */
  readonly penalty: Float64Array | null;
}

export function modelColumns(design: Design, groups: readonly AttributeGroup[], rule: FitRule): ModelColumns {
  const indexes = groups.flatMap((group) => [...group.columns]);
  const { penalty } = rule;
  return {
    indexes,
    values: indexes.map((index) => design.columns[index]!.values),
    penalty: penalty === null ? null : Float64Array.from(indexes, (index) => penalty[index]!),
  };
}

/** Does the work; what numerics refuses is said with attribute names (AppError, family "fit"). */
export function inClassWords<T>(design: Design, groups: readonly AttributeGroup[], work: () => T): T {
  try {
    return work();
  } catch (cause) {
    if (!(cause instanceof NumericsError)) throw cause;
    if (cause.code === "rankDeficient" && cause.columns.length === 0) throw notComputable(cause);
    throw inWords(
      cause,
      design,
      groups.flatMap((group) => [...group.columns]),
      groups,
    );
  }
}

/** Nothing to name: no single attribute is to blame. */
function notComputable(cause: NumericsError): AppError {
  return new AppError({
    family: "fit",
    code: "not-computable",
    what: `The fit cannot be worked out: ${cause.message}.`,
    where: "Price model",
    whatToDo: "Use another estimator or error rule, or leave attributes out.",
    cause,
  });
}
