/** Evidence kept in memory is asked for again only when something that columns depend on has changed. */
import { describe, expect, test } from "vitest";
import { rememberEvidence } from "../../src/app/rememberEvidence.ts";
import type { AssetClass } from "../../src/domain/assetClass.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const COLUMNS = sales({ seed: 5, count: 40, together: 0.5 });

function asked() {
  const memory = rememberEvidence();
  let reads = 0;
  const ask = (change: Partial<PriceModel> = {}, dataVersion = 1, effectiveOn = SUBJECT.effectiveOn) => {
    const assetClass = { ...CLASS, id: 1, dataVersion } as AssetClass;
    const input = { assetClass, model: model(change), subject: { ...SUBJECT, effectiveOn }, levels: [0.9] };
    return memory.recall(assetClass, input, () => {
      reads += 1;
      return COLUMNS;
    });
  };
  return { ask, reads: () => reads, memory };
}

describe("rememberEvidence", () => {
  test("keeps the columns while attributes are left out and put back, and other estimators are tried", () => {
    const { ask, reads } = asked();
    const first = ask();
    expect(ask({ leftOut: ["hours"] })).toBe(first);
    expect(ask({ estimator: { kind: "huber" }, errors: { kind: "HC3" }, range: "jackknife+" })).toBe(first);
    expect(reads()).toBe(1);
  });

  test("reads anew after any write to the sales, another filter, form or effective date", () => {
    const { ask, reads } = asked();
    ask();
    ask({}, 2);
    ask({ response: "price" }, 2);
    ask({ market: "none" }, 2);
    ask({}, 2, "2023-01-01");
    expect(reads()).toBe(5);
  });

  test("keeps the one before, so that an undo is answered from memory, and no more than that", () => {
    const { ask, reads } = asked();
    const first = ask();
    ask({ response: "price" });
    expect(ask()).toBe(first);
    ask({ market: "none" });
    ask();
    expect(reads()).toBe(4);
  });
});
