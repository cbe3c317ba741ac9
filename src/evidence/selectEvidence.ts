/** Which sales count, with a reason for each one that does not. Counts always add up: read = used + Σ out. */
import type { EvidenceAccount } from "../domain/appraisal.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import { type Day, dayNumber, dayOf } from "../domain/day.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { FilterContext } from "./filters/filter.ts";
import { EVIDENCE_FILTERS } from "./filters/index.ts";

export interface SelectedEvidence {
  readonly account: EvidenceAccount;
  /** Indexes into the sale columns, ascending. */
  readonly used: Int32Array;
}

/**
 * Guards: no sales → nothing used, nothing out; an unknown attribute key counts as a value that is missing everywhere.
 */
export function selectEvidence(
  sales: SaleColumns,
  assetClass: NewAssetClass,
  model: PriceModel,
  effectiveOn: Day | null,
): SelectedEvidence {
  const context: FilterContext = {
    sales,
    assetClass,
    model,
    effectiveOn: effectiveOn === null ? null : dayNumber(effectiveOn),
  };
  const used: number[] = [];
  const out = new Map<string, { rule: number; detail: string; ids: number[] }>();
  for (let at = 0; at < sales.count; at++) {
    const found = reasonOf(context, at);
    if (found === null) used.push(at);
    else {
      const key = `${found.rule} ${found.detail}`;
      const entry = out.get(key) ?? { ...found, ids: [] };
      entry.ids.push(sales.ids[at]!);
      out.set(key, entry);
    }
  }
  const reasons = [...out.values()]
    .sort((a, b) => a.rule - b.rule || b.ids.length - a.ids.length)
    .map(({ rule, detail, ids }) => ({
      reason: EVIDENCE_FILTERS[rule]!.reason,
      detail,
      sentence: EVIDENCE_FILTERS[rule]!.sentence(ids.length, detail, context),
      saleIds: ids,
    }));
  return { account: accountOf(sales, used, reasons), used: Int32Array.from(used) };
}

function reasonOf(context: FilterContext, at: number): { rule: number; detail: string } | null {
  for (let rule = 0; rule < EVIDENCE_FILTERS.length; rule++) {
    const detail = EVIDENCE_FILTERS[rule]!.out(context, at);
    if (detail !== null) return { rule, detail };
  }
  return null;
}

/** The account of the rows used; without reasons, they are all there is. */
export function accountOf(
  sales: SaleColumns,
  used: ArrayLike<number> & Iterable<number>,
  out: EvidenceAccount["out"] | null = null,
): EvidenceAccount {
  const counts = new Map<string, number>();
  let first = Number.POSITIVE_INFINITY;
  let last = Number.NEGATIVE_INFINITY;
  let verifiedCount = 0;
  for (const at of used) {
    counts.set(sales.channels.at(at)!, (counts.get(sales.channels.at(at)!) ?? 0) + 1);
    first = Math.min(first, sales.soldOn[at]!);
    last = Math.max(last, sales.soldOn[at]!);
    verifiedCount += sales.verified[at] === 1 ? 1 : 0;
  }
  return {
    read: out === null ? used.length : sales.count,
    used: used.length,
    out: out ?? [],
    firstSoldOn: used.length === 0 ? null : dayOf(first),
    lastSoldOn: used.length === 0 ? null : dayOf(last),
    channels: [...counts]
      .sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1))
      .map(([channel, count]) => ({ channel, count })),
    verifiedCount,
  };
}
