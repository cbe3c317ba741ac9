/** Whether a sale is evidence, and if not why, from the account that the fit gives: never judged here. */
import type { EvidenceAccount } from "../../domain/appraisal.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { dayNumber, dayOf } from "../../domain/day.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import type { Channel, Sale } from "../../domain/sale.ts";
import { NO_FILTER, NO_VALUE_FILTER } from "./filters.ts";
import type { SalesFilter } from "./pageBook.ts";

export interface SaleState {
  readonly mark: "in" | "setAside" | "filtered" | "missing" | "unknown";
  readonly words: string;
}

type Out = EvidenceAccount["out"][number];

const IN: SaleState = { mark: "in", words: "in evidence" };

function outState({ reason, detail }: Out, attributes: readonly Attribute[]): SaleState {
  const label = lowerStart(attributes.find(({ key }) => key === detail)?.label ?? detail ?? "a value");
  switch (reason) {
    case "set-aside":
      return { mark: "setAside", words: `set aside: ${detail ?? ""}` };
    case "value-missing":
      return { mark: "missing", words: `${label} missing` };
    case "no-logarithm":
      return { mark: "missing", words: `no logarithm: ${label}` };
    case "channel":
      return { mark: "filtered", words: `filtered: ${detail ?? "channel"}` };
    case "too-early":
      return { mark: "filtered", words: "filtered: too early" };
    case "too-late":
      return { mark: "filtered", words: "filtered: too late" };
    case "after-effective-date":
      return { mark: "filtered", words: "after effective date" };
    case "not-verified":
      return { mark: "filtered", words: "filtered: not verified" };
    case "other-currency":
      return { mark: "filtered", words: `other currency: ${detail ?? ""}` };
    case "other-price-basis":
      return { mark: "filtered", words: "other price basis" };
  }
}

/** One look-up for the whole register. Without an account only what the sale itself says is known. */
export function stateOfSales(
  account: EvidenceAccount | null,
  attributes: readonly Attribute[],
): (sale: Pick<Sale, "id" | "setAside">) => SaleState {
  const out = new Map<number, SaleState>();
  for (const one of account?.out ?? []) {
    const state = outState(one, attributes);
    for (const id of one.saleIds) out.set(id, state);
  }
  return ({ id, setAside }) => {
    if (setAside !== null) return { mark: "setAside", words: `set aside: ${setAside.reason}` };
    const found = out.get(id);
    // Put back just now: the account is a moment behind.
    if (found !== undefined && found.mark !== "setAside") return found;
    return account === null ? { mark: "unknown", words: "not judged yet" } : IN;
  };
}

export interface OutLine {
  readonly count: number;
  readonly words: string;
  /** Lists them; null where the register can't be filtered by this reason. */
  readonly filter: SalesFilter | null;
}

function filterOf({ reason, detail }: Out, model: PriceModel): SalesFilter | null {
  const next = (step: number): string | null => {
    const number = dayNumber(detail ?? "");
    return number === null ? null : dayOf(number + step);
  };
  const channels = model.filter.channels === null ? null : [...model.filter.channels];
  const rest: SalesFilter = { ...NO_FILTER, state: "in", channels };
  switch (reason) {
    case "channel":
      return { ...rest, channels: [detail as Channel] };
    case "too-early":
      return { ...rest, soldTo: next(-1) };
    case "too-late":
    case "after-effective-date":
      return { ...rest, soldFrom: next(1) };
    case "not-verified":
      return { ...rest, verified: "no" };
    case "value-missing":
      return detail === null ? null : { ...rest, values: { [detail]: { ...NO_VALUE_FILTER, missing: true } } };
    default:
      return null;
  }
}

/** "18 asking prices, kept out by the filter." → "asking prices, kept out by the filter" */
function withoutCount(sentence: string): string {
  return sentence.replace(/^[\d,.\s\u00a0]+/, "").replace(/\.$/, "");
}

/** What stands between register and evidence, a line a reason; all that persons set aside is one line. */
export function outLines(account: EvidenceAccount, model: PriceModel): readonly OutLine[] {
  const byPerson = account.out.filter(({ reason }) => reason === "set-aside");
  const setAside = byPerson.reduce((sum, { saleIds }) => sum + saleIds.length, 0);
  const first: OutLine[] =
    setAside === 0
      ? []
      : [
          {
            count: setAside,
            words: "set aside by a person, with a reason",
            filter: { ...NO_FILTER, state: "setAside" },
          },
        ];
  const others = account.out
    .filter(({ reason }) => reason !== "set-aside")
    .map((out) => ({
      count: out.saleIds.length,
      words: withoutCount(out.sentence),
      filter: filterOf(out, model),
    }));
  return [...first, ...others];
}

/** "597 of 640 sales are evidence; 43 are not, and each says why." in parts: the number, and the rest. */
export function evidenceSentence({ read, used }: EvidenceAccount): { readonly strong: string; readonly rest: string } {
  const out = read - used;
  const rest =
    out === 0
      ? ` of ${formatNumber(read)} sales are evidence: all of them.`
      : ` of ${formatNumber(read)} sales are evidence; ${formatNumber(out)} ${out === 1 ? "is" : "are"} not, and each says why.`;
  return { strong: formatNumber(used), rest };
}
