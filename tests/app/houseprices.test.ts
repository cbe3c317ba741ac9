/**
 * The main job on published data: 546 house sales (Anglin & Gencay 1996, JAE 11, 633–648, table III), from CSV through
 * import, store, fit, price and ledger, against values refined to 45 digits (tests/reference/README.md).
 */
import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import { EVERYTHING, type PriceModel } from "../../src/domain/priceModel.ts";
import { readFonts } from "../../src/shells/readFonts.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

const csv = readFileSync(new URL("../reference/houseprices/houseprices.csv", import.meta.url));
const expected = JSON.parse(readFileSync(new URL("../reference/houseprices/expected.json", import.meta.url), "utf8"));
const LEVELS = [0.8, 0.9, 0.95];
const YES_NO = ["driveway", "recreation", "fullbase", "gasheat", "aircon", "prefer"];

let handlers: Handlers;
let classId: number;
let model: PriceModel;

beforeAll(async () => {
  handlers = createHandlers(testPorts({ store: openStore(":memory:"), fonts: readFonts() }));
  const file = { fileName: "houseprices.csv", bytesBase64: csv.toString("base64") };
  const preview = await handlers.previewImport({ ...file, classId: null, options: null, match: null });
  const match = {
    ...preview.match,
    fixed: { ...preview.match.fixed, soldOn: "1987-07-31", currencyCode: "CAD", source: "published data" },
  };
  const outcome = await handlers.startClassFromFile({
    ...file,
    name: "Houses",
    itemWord: "house",
    options: preview.options,
    match,
  } as never);
  expect(outcome.batch).toMatchObject({ read: 546, accepted: 546 - outcome.batch.duplicates, heldBack: 0 });
  classId = outcome.classId;
  const order = [...YES_NO.slice(0, 5), "garage", "prefer", "lotsize", "bedrooms", "bathrooms", "stories"];
  model = {
    response: "lnPrice",
    attributes: order.map((key) => ({
      key,
      form: YES_NO.includes(key) ? "yesNo" : key === "lotsize" ? "ln" : "line",
      reference: null,
    })),
    leftOut: [],
    market: "none",
    filter: EVERYTHING,
  };
});

async function price(row: number, leftOut: string[] = []): Promise<Appraisal> {
  const { attributes } = expected.newRows[row];
  const values = Object.fromEntries(
    Object.entries(attributes).map(([key, value]) => [key, YES_NO.includes(key) ? value === "yes" : value]),
  );
  const subject = {
    title: `New house ${row + 1}`,
    serial: null,
    identifiedBy: null,
    values,
    effectiveOn: "1987-07-31",
  };
  const input = { classId, model: { ...model, leftOut }, subject, levels: LEVELS };
  return (await handlers.appraise(input as never)).appraisal;
}

/** Name of a coefficient as the expected values have it. */
function nameOf({ attribute, level }: { attribute: string; level: string | null }): string {
  if (attribute === "intercept") return "(Intercept)";
  return level === "yes" ? `${attribute}yes` : attribute === "lotsize" ? "log(lotsize)" : attribute;
}

function expectClose(found: number, wanted: number, tolerance = 1e-10): void {
  expect(Math.abs(found - wanted)).toBeLessThanOrEqual(tolerance * Math.abs(wanted));
}

describe("the fit", () => {
  test("every sale of the file is evidence, repeated rows of other houses included", async () => {
    const { evidence } = await price(0);
    expect(evidence.used).toBe(546);
  });

  test("coefficients, standard errors and HC3 have ten digits", async () => {
    const { report } = await price(0);
    expect(report.coefficients).toHaveLength(12);
    for (const one of report.coefficients) {
      const name = nameOf(one);
      expectClose(one.estimate, expected.ols.coefficients[name]);
      expectClose(one.standardError!, expected.ols.se[name]);
      expectClose(one.hc3StandardError!, expected.ols.seRobust.HC3[name]);
      expectClose(one.low95!, expected.ols.ci95[name][0]);
      expectClose(one.high95!, expected.ols.ci95[name][1]);
    }
  });

  test("fit measures have ten digits", async () => {
    const { report } = await price(0);
    expectClose(report.s!, expected.ols.sigma);
    expectClose(report.r2!, expected.ols.r2);
    expectClose(report.adjustedR2!, expected.ols.adjR2);
    expectClose(report.looR2!, expected.crossValidation.looR2_sstFullMean);
    expectClose(report.smearing!, expected.retransformation.duanSmearing);
    expect(report.residualDf).toBe(534);
    for (const { key, times } of report.widening) {
      expectClose(times ** 2, expected.collinearity.gvifPerTerm[key === "lotsize" ? "log(lotsize)" : key].GVIF);
    }
  });
});

describe("the five new houses", () => {
  test.each([0, 1, 2, 3, 4])("row %i: price, mean and both ranges have ten digits", async (row) => {
    const wanted = expected.newRows[row];
    const { price: found } = (await price(row)).priced!;
    expectClose(found.fitted, wanted.fitLog);
    expectClose(found.amount, wanted.priceNaive);
    expectClose(found.meanAmount, wanted.priceDuan);
    expectClose(found.leverage, wanted.leverage);
    expectClose(found.standardErrorOfAverage!, wanted.seMean);
    for (const [at, level] of LEVELS.entries()) {
      const percent = Math.round(level * 100);
      const one = found.rangeForOneSale[at]!;
      expectClose(one.low, wanted[`pi${percent}`].price[0]);
      expectClose(one.high, wanted[`pi${percent}`].price[1]);
      expectClose(Math.log(found.rangeForAverage[at]!.low), wanted[`ciMean${percent}`].log[0]);
      expectClose(Math.log(found.rangeForAverage[at]!.high), wanted[`ciMean${percent}`].log[1]);
    }
  });
});

describe("the ledger", () => {
  test.each(YES_NO.slice(0, 3))("with %s left out, short coefficients and shifts have ten digits", async (key) => {
    const drop = expected.omittedVariable.drops[key];
    const { ledger } = await price(0, [key]);
    expect(ledger.identityError).toBeLessThan(1e-10);
    for (const row of ledger.rows) {
      const name = nameOf(row);
      expectClose(row.coefficient, drop.bShort[name]);
      expectClose(row.ownPart, expected.ols.coefficients[name]);
      expectClose(row.carriedParts[0]!.amount, drop.shift[name], 1e-9);
    }
  });
});

describe("the sheet", () => {
  test("of a new house is issued and verified from its bytes alone", async () => {
    const { attributes } = expected.newRows[1];
    const values = Object.fromEntries(
      Object.entries(attributes).map(([key, value]) => [key, YES_NO.includes(key) ? value === "yes" : value]),
    );
    const subject = { title: "New house 2", serial: null, identifiedBy: null, values, effectiveOn: "1987-07-31" };
    const words = Object.fromEntries(
      ["client", "intendedUsers", "intendedUse", "interest", "basisDefinition", "inspected", "exposureTime"].map(
        (key) => [key, ""],
      ),
    );
    const engagement = {
      ...words,
      basisOfValue: "market value",
      premise: "in place",
      marketLevel: "private sale",
      priceBasisWords: "as published",
      reportOn: "1987-08-01",
      earlierSales: "",
      equipment: "",
      practice: "",
      practiceLine: "",
      valuer: "",
      ownCaveats: [],
    };
    const request = { model, subject, engagement, levels: LEVELS, overrideReason: null, adjustments: [] };
    const { bytesBase64 } = await handlers.issueSheet({ classId, request } as never);
    const report = await handlers.verifySheet({ bytesBase64 });
    expect(report).toMatchObject({ verdict: "stands", problems: [], differentCount: 0, bytesIntact: true });
    const figures = report.figures.map(({ recomputed }) => recomputed).filter((one) => typeof one === "number");
    const near = figures.filter((one) => Math.abs(one / expected.newRows[1].priceNaive - 1) < 1e-10);
    expect(near.length).toBeGreaterThan(0);
  });
});
