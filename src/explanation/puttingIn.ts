/**
 * The other way round: what would come of each left-out attribute, were it alone put into the set in use. One fit each, on the
 * same sales, at the weights and penalties of the fit in use. Money per step: P̄·(e^(b·step) − 1) after ln, as in the ledger.
 */
import type { PuttingIn } from "../domain/puttingIn.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { fitColumns } from "../hedonic/fitPriceModel.ts";
import { type Reading, readingsOf, readOff } from "../hedonic/readings.ts";
import { NumericsError } from "../numerics/numericsError.ts";
import { estimatePrice } from "../valuation/estimatePrice.ts";
import { moneyPerUnit } from "./carryOver.ts";

export interface PuttingInInput {
  /** Groups of the reference set (after exact dependencies). */
  readonly reference: readonly AttributeGroup[];
  readonly fit: Fit;
  readonly row: SubjectRow | null;
  readonly averagePrice: number;
}

/** In the order of the reference set; an attribute that cannot be told apart from those in use is not in it. */
export function puttingIn(input: PuttingInInput): PuttingIn[] {
  const { reference, fit } = input;
  const left = reference.filter(({ key }) => !fit.groups.some((group) => group.key === key));
  return left.flatMap((group) => {
    const kept = reference.filter((one) => one === group || fit.groups.some(({ key }) => key === one.key));
    try {
      return [withIt(input, group, fitColumns(fit.design, kept, fit.rule))];
    } catch (cause) {
      if (cause instanceof NumericsError) return [];
      throw cause;
    }
  });
}

function withIt({ fit, row, averagePrice }: PuttingInInput, { key, label }: AttributeGroup, wider: Fit): PuttingIn {
  const report = { response: fit.design.responseForm, averagePrice };
  const moneyOf = (reading: Reading, of: Fit): number => {
    const estimate = readOff(reading, of.solution.slopes);
    return estimate * moneyPerUnit(report, estimate, reading.step);
  };
  const readings = readingsOf(wider);
  const now = readingsOf(fit);
  const isKnown = row !== null && !row.notKnown.includes(key);
  const priceOf = (of: Fit): number => estimatePrice(of, row!, [], null).amount;
  return {
    key,
    label,
    own: readings
      .filter(({ attribute }) => attribute === key)
      .map((one) => ({ level: one.level, stepWords: one.stepWords, money: moneyOf(one, wider) })),
    changes: now.flatMap((one) => {
      const then = readings.find(({ attribute, level }) => attribute === one.attribute && level === one.level);
      if (then === undefined) return [];
      const { attribute, label: name, level, stepWords } = one;
      return [{ attribute, label: name, level, stepWords, from: moneyOf(one, fit), to: moneyOf(then, wider) }];
    }),
    priceMove: isKnown ? priceOf(wider) - priceOf(fit) : null,
  };
}
