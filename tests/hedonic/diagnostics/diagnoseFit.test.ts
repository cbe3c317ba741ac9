/** Checks of a fit against 45-digit values: tests/reference/README.md (houseprices, diamonds600). */
import { describe, expect, test } from "vitest";
import { diagnoseFit } from "../../../src/hedonic/diagnoseFit.ts";
import { DIAGNOSTICS } from "../../../src/hedonic/diagnostics/index.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { publishedDesign } from "../../fixtures/plainDesign.ts";
import { referenceChecks } from "../../fixtures/referenceChecks.ts";
import { referenceSales } from "../../fixtures/referenceSales.ts";

describe.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("the checks of the %s", (name, tolerance) => {
  const { influence } = referenceSales(name);
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const diagnoses = diagnoseFit(fit);

  test.each([
    ["spread", "breuschPaganStudentized", "stat"],
    ["spreadWithPrice", "whiteSpecialOnFitted", "stat"],
    ["shape", "jarqueBera", "stat"],
    ["curvature", "ramseyReset", "F"],
  ])("%s: statistic, degrees of freedom and p are the published ones", (code, key, statistic) => {
    const found = diagnoses.found.find((each) => each.code === code)!;
    const wanted = referenceChecks(name).tests[key];
    expect(Math.abs(found.statistic / wanted[statistic] - 1)).toBeLessThan(tolerance);
    expect(found.df).toEqual([wanted.df].flat());
    // A tail multiplies the relative error of its statistic by about half of it.
    if (wanted.p > 0) expect(Math.abs(found.p! / wanted.p - 1)).toBeLessThan(tolerance * (1 + found.statistic));
  });

  test("the sale furthest out is the published one", () => {
    const most = Math.max(...influence.map((row) => Math.abs(row.rstudent!)));
    const found = diagnoses.found.find(({ code }) => code === "outlier")!;
    expect(Math.abs(found.statistic / most - 1)).toBeLessThan(tolerance);
  });

  test("of a weighted fit only what holds under weights is said, and of the rest the reason", () => {
    const weighted = diagnoseFit({ ...fit, rule: { weights: new Float64Array(design.n).fill(1), penalty: null } });
    expect(weighted.found.map(({ code }) => code).sort()).toEqual(["collinearity", "influence"]);
    expect(weighted.leftOut).toHaveLength(DIAGNOSTICS.length - 2);
    for (const { reason } of weighted.leftOut) expect(reason).toContain("equal weights");
  });

  test("every check is run once, the most serious finding first", () => {
    expect(diagnoses.found.map(({ code }) => code).sort()).toEqual(DIAGNOSTICS.map(({ code }) => code).sort());
    const severity = diagnoses.found.map(({ verdict }) => ["trouble", "look", "fine"].indexOf(verdict));
    expect(severity).toEqual([...severity].sort());
  });
});
