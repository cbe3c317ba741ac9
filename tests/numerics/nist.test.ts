/** The eleven NIST StRD linear sets: digits reached in coefficients and their standard errors, with a floor for each set. */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { type CertifiedSet, reachedDigits } from "../../src/app/reachedDigits.ts";

const sets: Record<string, CertifiedSet> = JSON.parse(
  readFileSync(new URL("../reference/nist/strd-linear.json", import.meta.url), "utf8"),
);

/** Least digits asked of coefficients and of their standard errors. Filip: what its inputs, rounded to doubles, allow. */
const FLOORS: Record<string, readonly [number, number]> = {
  Norris: [13, 13],
  Pontius: [13, 13],
  NoInt1: [13, 13],
  NoInt2: [13, 13],
  Filip: [7, 7],
  Longley: [13, 13],
  Wampler1: [13, 13],
  Wampler2: [13, 13],
  Wampler3: [13, 13],
  Wampler4: [13, 13],
  Wampler5: [13, 13],
};

describe("NIST StRD, linear least squares (certified values)", () => {
  test("all eleven sets are there", () => {
    expect(Object.keys(sets).sort()).toEqual(Object.keys(FLOORS).sort());
  });

  test.each(Object.entries(FLOORS))(
    "%s reaches its digits, and claims no more than one beyond them (it speaks of slopes)",
    (name, [least, leastOfErrors]) => {
      const found = reachedDigits(name, sets[name]!);
      expect(found.coefficients).toBeGreaterThanOrEqual(least);
      expect(found.standardErrors).toBeGreaterThanOrEqual(leastOfErrors);
      expect(found.residualDeviation).toBeGreaterThanOrEqual(Math.min(least, 12));
      expect(found.digitsToTrust).toBeLessThanOrEqual(Math.ceil(found.coefficients) + 1);
    },
  );
});
