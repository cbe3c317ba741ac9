/**
 * The subject's price averaged over the best defensible sets by stacking: weights on the simplex that make least
 *   Σ_i w_i (y_i − Σ_k v_k ŷ_k(−i))² = v′(E′E)v,   E_ik = √w_i e_ik/(1 − h_ik),  Σ v = 1
 * (Yao, Vehtari, Simpson & Gelman 2018, section 2; stacking of means: Breiman 1996). The range is that of the mixture, as with
 * Akaike weights. Errors and weights on the response's scale.
 */
import type { StackedPrice } from "../domain/attributeSets.ts";
import type { Column } from "../numerics/column.ts";
import { simplexWeights } from "../numerics/simplexWeights.ts";
import { leaveOneOutRows } from "../numerics/subsetErrors.ts";
import { mixedPrice, type SetPrices } from "./averagedPrice.ts";
import { backFrom, columnsOf, type SetTable, typicalError } from "./setTable.ts";

/** Common practice, no source: beyond the best sixty sets a mixture gains nothing that shows. */
const MOST_SETS = 60;
/** Rows × columns² over all sets: some half a second. */
const WORK = 2e8;

/** Errors of each sale priced without itself, kept by set: a wider rule asks for the same ones again. */
export type KeptErrors = Map<number, Float64Array | null>;

/** Null when no defensible set has a price, a range and an error for every sale. */
export function stackedPrice(
  sets: SetTable,
  prices: SetPrices,
  defensible: readonly number[],
  kept: KeptErrors,
): StackedPrice | null {
  const { fit, moments, table } = sets;
  const width = fit.design.columns.length + 1;
  const most = Math.max(1, Math.min(MOST_SETS, Math.floor(WORK / (fit.design.n * width * width))));
  const hasRange = (set: number) => Number.isFinite(prices.fitted[set]!) && Number.isFinite(prices.variances[set]!);
  const tried = defensible.filter(hasRange).slice(0, most);
  const chosen = tried.flatMap((set) => {
    const errors = errorsWithout(sets, set, kept);
    return errors === null ? [] : [{ set, errors }];
  });
  if (chosen.length === 0) return null;
  const gram = crossProducts(chosen.map(({ errors }) => errors));
  const found = simplexWeights(gram, chosen.length);
  const weights = new Float64Array(table.r2.length);
  chosen.forEach(({ set }, k) => {
    weights[set] = found[k]!;
  });
  const squares = chosen.map((_, k) => gram[k * (chosen.length + 1)]!);
  return {
    ...mixedPrice(prices, weights, backFrom(fit.design)),
    over: chosen.length,
    error: typicalError(fit, moments, mixtureSum(gram, found)),
    errorOfBest: typicalError(fit, moments, Math.min(...squares)),
  };
}

function errorsWithout({ fit, moments, groups, alwaysIn }: SetTable, set: number, kept: KeptErrors) {
  const found = kept.get(set);
  if (found !== undefined) return found;
  const { design, rule } = fit;
  const values: Column[] = design.columns.map((column) => column.values);
  const inside = [...alwaysIn, ...groups.filter((_, g) => (set & (1 << g)) !== 0)];
  const options = { alwaysIn: columnsOf(inside).flat(), penalty: rule.penalty, weights: rule.weights };
  const errors = leaveOneOutRows(moments, values, design.response, options);
  kept.set(set, errors);
  return errors;
}

function crossProducts(lists: readonly Float64Array[]): Float64Array {
  const m = lists.length;
  const gram = new Float64Array(m * m);
  for (let a = 0; a < m; a++) {
    for (let b = a; b < m; b++) {
      const [left, right] = [lists[a]!, lists[b]!];
      let sum = 0;
      for (let i = 0; i < left.length; i++) sum += left[i]! * right[i]!;
      gram[a * m + b] = sum;
      gram[b * m + a] = sum;
    }
  }
  return gram;
}

function mixtureSum(gram: Float64Array, weights: Float64Array): number {
  const m = weights.length;
  return gram.reduce((sum, value, at) => sum + value * weights[Math.floor(at / m)]! * weights[at % m]!, 0);
}
