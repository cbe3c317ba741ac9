/** Seven exact dependencies of an invented machinery file, from CSV to words (tests/reference/README.md, aliasing). */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { tryFile } from "../../src/app/tryFile.ts";

const bytes = new Uint8Array(readFileSync(new URL("../reference/aliasing/machinery.csv", import.meta.url)));
const REFERENCE = ["cls", "model", "region", "kw", "hp", "months_used", "years_used", "hours_work", "hours_idle"];

function tried(leaveOut: readonly string[] = [], further: readonly string[] = []) {
  return tryFile({
    fileName: "machinery.csv",
    bytes,
    price: "price",
    attributes: [...REFERENCE, "hours_total", "build_year_index", "currency", ...further],
    choices: [],
    ln: [],
    leaveOut,
    response: "lnPrice",
    levels: [0.9],
    today: "2026-01-01",
    subject: () => null,
  }).appraisal.report;
}

test("all seven are found and written as equations in the file's own words", () => {
  const report = tried();
  const equations = report.dependencies.map(({ equation }) => equation);
  expect(equations).toHaveLength(7);
  expect(equations).toEqual(
    expect.arrayContaining([
      "currency = EUR",
      "hp = 1.36 × kw",
      "years_used = months_used ÷ 12",
      "hours_total = hours_work + hours_idle",
      "build_year_index = 2024 − months_used ÷ 12",
    ]),
  );
  expect(equations.filter((one) => one.startsWith("model "))).toHaveLength(2);
  expect(report.rank).toBe(13);
  expect(report.leftOut.every(({ why }) => why === "exact")).toBe(true);
});

test("leaving out another one of the same keeps the fit as it was", () => {
  const [usual, other] = [tried(), tried(["kw", "months_used"])];
  expect(other.attributes).toEqual(expect.arrayContaining(["hp", "years_used"]));
  expect(Math.abs(other.r2! / usual.r2! - 1)).toBeLessThan(1e-12);
  expect(other.dependencies).toHaveLength(7);
});

test("a plate value rounded to whole hp moves with kW, but is not called exact", () => {
  const report = tried([], ["hp_plate"]);
  expect(report.attributes).toContain("hp_plate");
  expect(report.dependencies).toHaveLength(7);
  expect(report.widening.find(({ key }) => key === "hp_plate")!.times).toBeGreaterThan(100);
});
