/** A glance comes before a slow answer, is never final, and is replaced by the answer. */
import { describe, expect, test } from "vitest";
import type { Client } from "../../../src/contract/client.ts";
import type { RequestInput } from "../../../src/contract/requests.ts";
import type { GlancedPrice } from "../../../src/domain/appraisal.ts";
import { askPrice } from "../../../src/screens/workbench/askPrice.ts";
import { refined, whileRefined } from "../../../src/screens/workbench/useAppraisal.ts";

const SLOW = 900;
const glanced: GlancedPrice = { price: { amount: 12, rangeForOneSale: [] }, coefficients: [], isFinal: false };
const priced = (amount: number) =>
  ({ priced: { price: { amount, rangeForOneSale: [] } }, report: { looTypicalError: 0.1 } }) as never;
const answered = { appraisal: priced(13), dataVersion: 1, milliseconds: SLOW };
const input = { classId: 1, model: {}, subject: {}, levels: [0.9] } as unknown as RequestInput<"appraise">;

/** A core whose answers are given by hand. */
function core() {
  const asked: string[] = [];
  const give: Record<string, (value: unknown) => void> = {};
  const fail: Record<string, (cause: unknown) => void> = {};
  const ask = (name: string) =>
    new Promise((resolve, reject) => {
      asked.push(name);
      give[name] = resolve;
      fail[name] = reject;
    });
  return { client: { ask } as unknown as Client, asked, give, fail };
}

const soon = () => new Promise((resolve) => setTimeout(resolve, 0));

describe("asking for the price", () => {
  test("asks a glance first where the last answer took long, and shows it before the answer", async () => {
    const { client, asked, give } = core();
    const seen: GlancedPrice[] = [];
    const waiting = askPrice(client, input, SLOW, (one) => seen.push(one));
    expect(asked).toEqual(["glance", "appraise"]);
    give.glance!(glanced);
    await soon();
    expect(seen).toEqual([glanced]);
    give.appraise!(answered);
    expect(await waiting).toBe(answered);
  });

  test("asks none where the last answer was quick, before the first, or without an item", async () => {
    const { client, asked } = core();
    const never = (): never => expect.fail("no glance was asked");
    void askPrice(client, input, 20, never);
    void askPrice(client, input, null, never);
    void askPrice(client, { ...input, subject: null }, SLOW, never);
    expect(asked).toEqual(["appraise", "appraise", "appraise"]);
  });

  test("passes over a glance that is null, fails or comes too late", async () => {
    for (const after of ["null", "failure", "late"] as const) {
      const { client, give, fail } = core();
      const seen: GlancedPrice[] = [];
      const waiting = askPrice(client, input, SLOW, (one) => seen.push(one));
      if (after === "null") give.glance!(null);
      if (after === "failure") fail.glance!(new Error("gone"));
      give.appraise!(answered);
      expect(await waiting).toBe(answered);
      if (after === "late") give.glance!(glanced);
      await soon();
      expect(seen).toEqual([]);
    }
  });
});

describe("the answer on the table", () => {
  const before = refined(priced(10), SLOW, null);

  test("keeps the last appraisal, and waits, while a glanced price stands in front", () => {
    const now = whileRefined(before, glanced);
    expect(now.appraisal).toBe(before.appraisal);
    expect(now.isWaiting).toBe(true);
    expect(now.glanced?.isFinal).toBe(false);
    expect(now.move).toMatchObject({ from: 10, to: 12 });
  });

  test("has no glanced price once the refined one is there", () => {
    const after = refined(answered.appraisal, SLOW, null);
    expect(after).toMatchObject({ glanced: null, isWaiting: false, appraisal: answered.appraisal });
  });
});
