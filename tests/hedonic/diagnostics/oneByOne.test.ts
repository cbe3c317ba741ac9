/** Single sales and attributes that move together, against 45-digit values: tests/reference/README.md (houseprices, diamonds600). */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Diagnosis, FitDiagnoses } from "../../../src/domain/diagnosis.ts";
import { AppError } from "../../../src/domain/errors.ts";
import { diagnoseFit } from "../../../src/hedonic/diagnoseFit.ts";
import type { Design } from "../../../src/hedonic/fit.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { numbersOf } from "../../../src/numerics/column.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { referenceSales } from "../../fixtures/referenceSales.ts";

const plain = { weights: null, penalty: null };
const diagnose = (design: Design) => diagnoseFit(fitColumns(design, design.groups, plain));
const findingOf = ({ found }: FitDiagnoses, code: Diagnosis["code"]) => found.find((one) => one.code === code)!;

describe.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("the %s", (name, tolerance) => {
  const { influence, expected } = referenceSales(name);
  const design = publishedDesign(name);
  const diagnoses = diagnose(design);
  const n = design.n;
  const p = design.columns.length + 1;

  test("have the published largest Cook's distance, the sales and counts that go with it", () => {
    const found = findingOf(diagnoses, "influence");
    const cooks = influence.map((row) => row.cooksD!);
    const most = Math.max(...cooks);
    expect(Math.abs(found.statistic / most - 1)).toBeLessThan(tolerance);
    expect(found.sales![0]).toBe(cooks.indexOf(most));
    const over = (values: number[], limit: number) => values.filter((value) => Math.abs(value) > limit).length;
    expect(found.details!.slice(0, 5).map(({ value }) => value)).toEqual([
      over(
        influence.map((row) => row.hat!),
        (2 * p) / n,
      ),
      over(
        influence.map((row) => row.hat!),
        (3 * p) / n,
      ),
      over(
        influence.map((row) => row.rstudent!),
        3,
      ),
      over(cooks, 4 / n),
      over(
        influence.map((row) => row.dffits!),
        2 * Math.sqrt(p / n),
      ),
    ]);
  });

  test("have the published inflation of every attribute, and the published largest condition index", () => {
    const found = findingOf(diagnoses, "collinearity");
    const inflations: number[] = Object.values(expected.collinearity.vifPerColumn);
    expect(Math.abs(found.statistic / Math.max(...inflations) - 1)).toBeLessThan(tolerance);
    const index = found.details!.find(({ label }) => label === "Largest condition index")!;
    const indices: number[] = expected.collinearity.scaledUncentred.conditionIndices;
    expect(Math.abs(index.value / indices.at(-1)! - 1)).toBeLessThan(tolerance);
  });

  test("are found the same in other units", () => {
    const columns = design.columns.map((column, j) => {
      const factor = [1000, 0.01, 7][j % 3]!;
      return { ...column, values: numbersOf(column.values).map((x) => x * factor) };
    });
    const scaled = diagnose(
      plainDesign(
        columns.map(({ values, attribute }) => ({ key: attribute, values, kind: "line" as const })),
        design.prices,
        { ln: true },
      ),
    );
    expect(scaled.found.map(({ code }) => code)).toEqual(diagnoses.found.map(({ code }) => code));
    scaled.found.forEach((one, at) => {
      const other = diagnoses.found[at]!;
      expect(Math.abs(one.statistic / other.statistic - 1)).toBeLessThan(tolerance);
      expect(one.verdict).toBe(other.verdict);
      expect(one.sales).toEqual(other.sales);
    });
  });
});

test("the inflation of a choice is that of its columns together (Fox & Monette 1992)", () => {
  const { columns, response, terms, groups, expected } = referenceSales("diamonds600");
  const levels = (group: readonly number[]) =>
    response.map((_, i) => 1 + group.findIndex((j) => numbersOf(columns[j]!)[i] === 1));
  const attributes = terms.map((key, at) =>
    groups[at]!.length > 1
      ? { key, values: levels(groups[at]!), kind: "choice" as const }
      : { key, values: numbersOf(columns[groups[at]![0]!]!), kind: "line" as const },
  );
  const found = findingOf(diagnose(plainDesign(attributes, response)), "collinearity");
  for (const { key, label } of terms.map((key) => ({ key, label: key.charAt(0).toUpperCase() + key.slice(1) }))) {
    const { value } = found.details!.find((detail) => detail.label === label)!;
    expect(Math.abs(value / expected.collinearity.gvifPerTerm[key].GVIF_1_2df - 1)).toBeLessThan(1e-7);
  }
});

test("two attributes that nearly say the same are named together, with how much wider their ranges are", () => {
  const n = 120;
  const age = Float64Array.from({ length: n }, (_, i) => (i * 7) % 30);
  const hours = age.map((x, i) => 400 * x + ((i * 31) % 17) * 150);
  const size = Float64Array.from({ length: n }, (_, i) => (i * 13) % 19);
  const prices = age.map((x, i) => 9000 - 100 * x + 50 * size[i]! + ((i * 5) % 13) * 20);
  const design = plainDesign(
    [
      { key: "age", values: age, kind: "line" },
      { key: "hours", values: hours, kind: "line" },
      { key: "size", values: size, kind: "line" },
    ],
    prices,
  );
  const found = findingOf(diagnose(design), "collinearity");
  expect(found.verdict).not.toBe("fine");
  expect([...found.attributes!].sort()).toEqual(["age", "hours"]);
  const share = 1 - 1 / found.statistic;
  expect(found.sentence).toContain(`${Math.round(100 * share)}`);
  expect(found.sentence).toContain(`${Math.sqrt(found.statistic).toFixed(1)} ×`);
});

test("one sale far out and far off holds the model, and is the one named", () => {
  const size = Float64Array.from({ length: 30 }, (_, i) => (i === 20 ? 300 : i));
  const prices = size.map((x, i) => (i === 20 ? 50 : 100 + 2 * x + (i % 3)));
  const found = findingOf(diagnose(plainDesign([{ key: "size", values: size, kind: "line" }], prices)), "influence");
  expect(found.verdict).toBe("trouble");
  expect(found.sales![0]).toBe(20);
});

test("few and like sales get findings that are numbers, or reasons", () => {
  fc.assert(
    fc.property(fc.integer({ min: 3, max: 12 }), fc.infiniteStream(fc.integer({ min: 0, max: 3 })), (n, stream) => {
      const draw = () => Float64Array.from({ length: n }, () => stream.next().value);
      const design = plainDesign(
        [
          { key: "size", values: draw(), kind: "line" },
          { key: "boxed", values: draw().map((x) => x % 2), kind: "yesNo" },
        ],
        draw().map((x) => 1 + x),
      );
      const diagnoses = diagnosesOf(design);
      if (diagnoses === null) return;
      expect(diagnoses.found.length + diagnoses.leftOut.length).toBe(12);
      for (const { statistic, p } of diagnoses.found) {
        expect(Number.isFinite(statistic)).toBe(true);
        if (p !== null) expect(p >= 0 && p <= 1).toBe(true);
      }
      for (const { reason } of diagnoses.leftOut) expect(reason).toMatch(/\.$/);
    }),
    { seed: 11, numRuns: 300 },
  );
});

/** Null where the sales carry no fit at all. */
function diagnosesOf(design: Design): FitDiagnoses | null {
  try {
    return diagnose(design);
  } catch (cause) {
    if (cause instanceof AppError) return null;
    throw cause;
  }
}
