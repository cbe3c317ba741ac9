import { describe, expect, test } from "vitest";
import { EVERYTHING, type PriceModel } from "../../../src/domain/priceModel.ts";
import {
  cycleForm,
  resolveByLeavingOut,
  setChannelIn,
  setReferenceMember,
  switchAttribute,
  switchChannel,
} from "../../../src/screens/priceModel/modelChanges.ts";
import { sameModel } from "../../../src/screens/workbench/sameModel.ts";

const model: PriceModel = {
  response: "lnPrice",
  attributes: [
    { key: "hours", form: "line", reference: null },
    { key: "make", form: "choice", reference: null },
  ],
  leftOut: [],
  market: "line",
  filter: EVERYTHING,
};

describe("changes of a price model", () => {
  test("switching twice gives the model back", () => {
    const out = switchAttribute(model, "hours", "number");
    expect(out.leftOut).toEqual(["hours"]);
    expect(sameModel(switchAttribute(out, "hours", "number"), model)).toBe(true);
  });
  test("switching an attribute outside of the reference set takes it in", () => {
    const taken = switchAttribute(model, "coupler", "yesNo");
    expect(taken.attributes.at(-1)).toEqual({ key: "coupler", form: "yesNo", reference: null });
  });
  test("leaving the reference set also forgets that it was left out", () => {
    const gone = setReferenceMember({ ...model, leftOut: ["hours"] }, "hours", "number", false);
    expect(gone.leftOut).toEqual([]);
    expect(gone.attributes.map((one) => one.key)).toEqual(["make"]);
  });
  test("a number goes from line to ln to a curve and back, a choice stays a choice", () => {
    expect(cycleForm(model, "hours").attributes[0]!.form).toBe("ln");
    expect(cycleForm(cycleForm(model, "hours"), "hours").attributes[0]!.form).toBe("spline");
    expect(cycleForm(cycleForm(cycleForm(model, "hours"), "hours"), "hours").attributes[0]!.form).toBe("line");
    expect(cycleForm(model, "make").attributes[1]!.form).toBe("choice");
  });
  test("an exact dependency is resolved by one of its choices, and others left out stay out", () => {
    const resolved = resolveByLeavingOut({ ...model, leftOut: ["kw", "make"] }, ["kw", "hp"], "hp");
    expect(resolved.leftOut).toEqual(["make", "hp"]);
  });
  test("the channel joins the set when it is wanted, and is carried when it is not", () => {
    const joined = setChannelIn(model, true);
    expect(joined.attributes[0]!.key).toBe("channel");
    expect(setChannelIn(joined, false).leftOut).toEqual(["channel"]);
    expect(setChannelIn(model, false)).toBe(model);
  });
  test("the last channel cannot be taken away, and all of them are no filter", () => {
    const one = { ...model, filter: { ...EVERYTHING, channels: ["auction"] as const } };
    expect(switchChannel(one, "auction")).toBe(one);
    const three = { ...model, filter: { ...EVERYTHING, channels: ["auction", "dealer", "private"] as const } };
    expect(switchChannel(three, "asking").filter.channels).toBeNull();
  });
});
