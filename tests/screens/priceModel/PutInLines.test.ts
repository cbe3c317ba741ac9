import { expect, test } from "vitest";
import { putInWords } from "../../../src/screens/priceModel/PutInLines.tsx";

test("a left-out attribute says what it would say, what it would change most and how far the price would move", () => {
  const change = (label: string, from: number, to: number) => ({
    attribute: label,
    label,
    level: null,
    stepWords: "a step",
    from,
    to,
  });
  const found = {
    key: "built",
    label: "Age",
    own: [{ level: null, stepWords: "1 year", money: -1632 }],
    changes: [change("Capacity", 3000, 3010), change("Hours", -2140, -712), change("Power", 500, 700)],
    priceMove: 1234,
  };
  expect(putInWords(found)).toBe(
    "With age in: itself −1,630 (1 year); hours −2,140 → −710 (a step); power 500 → 700 (a step); the price would move by +1,230.",
  );
  expect(putInWords({ ...found, priceMove: null })).toMatch(/not known/);
});
