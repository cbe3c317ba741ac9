import { describe, expect, test } from "vitest";
import { record, redo, startHistory, undo, type Work } from "../../../src/screens/workbench/history.ts";
import { moveBetween } from "../../../src/screens/workbench/useAppraisal.ts";

const work = (title: string): Work => ({ model: {}, subject: { title } }) as unknown as Work;

describe("undo and redo", () => {
  test("go back and forth over every change", () => {
    const twice = record(record(startHistory(work("a")), work("b"), null), work("c"), null);
    expect(undo(undo(twice)).now).toEqual(work("a"));
    expect(redo(undo(twice)).now).toEqual(work("c"));
  });
  test("keystrokes in one field are one step", () => {
    const typed = record(record(startHistory(work("")), work("T"), "title"), work("Te"), "title");
    expect(undo(typed).now).toEqual(work(""));
  });
  test("the same field after an undo is a new step", () => {
    const typed = record(startHistory(work("")), work("T"), "title");
    expect(record(undo(typed), work("U"), "title").past).toHaveLength(1);
  });
  test("a new change forgets what was undone", () => {
    const back = undo(record(startHistory(work("a")), work("b"), null));
    expect(redo(record(back, work("c"), null)).now).toEqual(work("c"));
  });
  test("with nothing to undo or redo nothing changes", () => {
    const fresh = startHistory(work("a"));
    expect(undo(fresh)).toBe(fresh);
    expect(redo(fresh)).toBe(fresh);
  });
});

describe("the move of a price", () => {
  const priced = (amount: number) =>
    ({ report: { looTypicalError: amount / 100 }, priced: { price: { amount, rangeForOneSale: [] } } }) as never;
  test("is from the former price to the new one", () => {
    expect(moveBetween(priced(10), priced(12))).toEqual({ from: 10, to: 12, fromRanges: [], fromTypicalError: 0.1 });
  });
  test("is none when there was no price, or it stayed", () => {
    expect(moveBetween(null, priced(12))).toBeNull();
    expect(moveBetween(priced(12), priced(12))).toBeNull();
    expect(moveBetween(priced(12), { priced: null } as never)).toBeNull();
  });
});
