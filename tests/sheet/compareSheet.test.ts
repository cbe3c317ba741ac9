/** What counts as the same figure: to the last bit within a version, to nine digits across versions. */
import { describe, expect, test } from "vitest";
import { compareSheet } from "../../src/sheet/compareSheet.ts";
import { sheetEvidence } from "../fixtures/sheetEvidence.ts";

type Evidence = ReturnType<typeof sheetEvidence>;

function changed(change: (evidence: Evidence) => void) {
  const own = sheetEvidence();
  const again = structuredClone(own);
  change(again as Evidence);
  return { own, again };
}

const different = (options: { otherVersion: boolean }, change: (evidence: Evidence) => void): string[] => {
  const { own, again } = changed(change);
  return compareSheet(own, again.appraisal, again.conclusion, options)
    .filter(({ equal }) => !equal)
    .map(({ name }) => name);
};

const nudge = (share: number) => (evidence: Evidence) => {
  const price = evidence.appraisal.priced!.price as { amount: number };
  price.amount *= 1 + share;
};

describe("compareSheet", () => {
  test("takes one unit in the last place for another figure within a version", () => {
    expect(different({ otherVersion: false }, nudge(2 ** -52))).toEqual(["price, unrounded"]);
  });

  test("takes nine digits for the same figure across versions, and eight for another", () => {
    expect(different({ otherVersion: true }, nudge(1e-11))).toEqual([]);
    expect(different({ otherVersion: true }, nudge(1e-8))).toEqual(["price, unrounded"]);
  });

  test("leaves out what the version that made the sheet did not know, and how it came to its numbers", () => {
    const more = (evidence: Evidence): void => {
      const report = evidence.appraisal.report as unknown as Record<string, unknown>;
      report.newFigure = 12;
      report.digitsToTrust = 3;
      report.path = "careful";
    };
    expect(different({ otherVersion: true }, more)).toEqual([]);
    expect(different({ otherVersion: false }, more)).toHaveLength(3);
  });
});
