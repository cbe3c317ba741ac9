/** The forms that attributes, market movement and pairs can take, through the whole appraisal. */
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { SaleColumns } from "../../src/domain/sale.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { numbersOf } from "../../src/numerics/column.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const SALES = sales({ seed: 12, count: 200, together: 0.7 });

function run(change: Partial<PriceModel>, subject: Subject | null = SUBJECT, columns: SaleColumns = SALES) {
  return computeAppraisal({ assetClass: CLASS, sales: columns, model: model(change), subject, levels: [0.9] });
}

function withForm(key: string, change: Partial<PriceModel["attributes"][number]>): Partial<PriceModel> {
  return { attributes: model().attributes.map((one) => (one.key === key ? { ...one, ...change } : one)) };
}

describe("curves", () => {
  test("read as what the price gains between knots, and the ledger adds up row by row", () => {
    const { appraisal, fit } = run({ ...withForm("hours", { form: "spline", knots: 4 }), leftOut: ["built"] });
    const rows = appraisal.ledger.rows.filter(({ attribute }) => attribute === "hours");
    expect(rows).toHaveLength(3);
    expect(rows.every(({ stepWords }) => /^from [\d,.]+ to [\d,.]+\u00a0h$/.test(stepWords))).toBe(true);
    expect(appraisal.ledger.identityError).toBeLessThan(1e-10);
    const group = fit.groups.find(({ key }) => key === "hours")!;
    const at = group.columns.map((index) => fit.solution.slopes[fit.columns.indexOf(index)]!);
    const value = (x: number) => group.numbersAt(x).reduce((sum, one, j) => sum + one * at[j]!, 0);
    group.knots.slice(1).forEach((to, j) => {
      expect(value(to) - value(group.knots[j]!)).toBeCloseTo(at[j]!, 9);
    });
  });

  test("are the straight line where the prices are straight", () => {
    const { hours, pull } = SALES.values;
    const price = hours!.map((h, i) => 50_000 - 3 * h + 900 * pull![i]!);
    const attributes = [
      { key: "hours", form: "spline" as const, reference: null },
      { key: "pull", form: "line" as const, reference: null },
    ];
    const plain = { ...SALES, price };
    const subject = { ...SUBJECT, values: { ...SUBJECT.values, hours: 30_000 } };
    const { appraisal } = run({ response: "price", market: "none", attributes }, subject, plain);
    const expected = 50_000 - 3 * 30_000 + 900 * Number(SUBJECT.values.pull);
    expect(appraisal.priced!.price.amount / expected).toBeCloseTo(1, 9);
    expect(appraisal.priced!.reach.attributes[0]!.sentence).toMatch(/goes on as a straight line/);
  });

  test("are refused with a sentence when too few values differ", () => {
    const values = { ...SALES.values, hours: SALES.values.hours!.map((h) => (h > 6000 ? 1 : 2)) };
    expect(() => run(withForm("hours", { form: "spline" }), null, { ...SALES, values })).toThrow(
      /Hours cannot be a curve with 4 knots/,
    );
  });
});

describe("choices", () => {
  test("read against the mean of their levels add up to zero, and differ as they do against one level", () => {
    const usual = run(withForm("make", {})).appraisal.report.coefficients.filter((one) => one.attribute === "make");
    const { appraisal } = run({ ...withForm("make", { reading: "sumToZero" }), leftOut: ["hours"] });
    const found = appraisal.report.coefficients.filter((one) => one.attribute === "make");
    expect(found.map(({ level }) => level).sort()).toEqual(["Orveld", "Quern", "Tessaly"]);
    expect(found.reduce((sum, one) => sum + one.estimate, 0)).toBeCloseTo(0, 12);
    expect(appraisal.ledger.identityError).toBeLessThan(1e-10);
    const all = run(withForm("make", { reading: "sumToZero" })).appraisal.report.coefficients;
    const of = (level: string) => all.find((one) => one.attribute === "make" && one.level === level)!.estimate;
    const base = ["Orveld", "Quern", "Tessaly"].find((level) => usual.every((one) => one.level !== level))!;
    for (const one of usual) expect(of(one.level!) - of(base)).toBeCloseTo(one.estimate, 12);
  });

  function withRareMakes() {
    const levels = ["Orveld", "Quern", "Tessaly", "Fenwold", "Ostrand"];
    const attributes = CLASS.attributes.map((one) => (one.key === "make" ? { ...one, levels } : one));
    const make = SALES.values.make!.map((level, i) => (i < 3 ? 3 : i < 5 ? 4 : level));
    return { assetClass: { ...CLASS, attributes }, columns: { ...SALES, values: { ...SALES.values, make } } };
  }

  test("with rare levels merged say which, price them as other, and never drop a sale", () => {
    const { assetClass, columns } = withRareMakes();
    const subject = { ...SUBJECT, values: { ...SUBJECT.values, make: "Ostrand" } };
    const input = {
      assetClass,
      sales: columns,
      subject,
      levels: [0.9],
      model: model(withForm("make", { rare: "merge" })),
    };
    const { appraisal, fit } = computeAppraisal(input);
    const levels = appraisal.report.coefficients.filter((one) => one.attribute === "make").map((one) => one.level);
    expect(levels).toContain("other");
    expect(levels).not.toContain("Fenwold");
    expect(fit.design.notes[0]).toBe(
      "Make: Fenwold (3) and Ostrand (2) have fewer than 5 sales each and are taken together as other, 5 sales.",
    );
    expect(appraisal.report.fitted!.notes).toEqual(fit.design.notes);
    expect(fit.design.n).toBe(200);
    const other = fit.design.columns.find(({ level }) => level === "other")!;
    expect(numbersOf(other.values).reduce((sum, one) => sum + one, 0)).toBe(5);
  });

  test("with levels drawn together price a level not seen at their mean, and keep rare ones nearer to it", () => {
    const { assetClass, columns } = withRareMakes();
    const input = {
      assetClass,
      sales: columns,
      subject: SUBJECT,
      levels: [0.9],
      model: model(withForm("make", { rare: "pool" })),
    };
    const pooled = computeAppraisal(input).appraisal.report.fitted!.pooled[0]!;
    expect(pooled.levels).toHaveLength(5);
    const share = (level: string) => {
      const one = pooled.levels.find((found) => found.level === level)!;
      return one.before === null ? 0 : Math.abs(one.after / one.before);
    };
    expect(share("Ostrand")).toBeLessThan(1);
    const unseen = { ...SUBJECT, values: { ...SUBJECT.values, make: "Nobody" } };
    const priced = computeAppraisal({ ...input, subject: unseen }).appraisal.priced!;
    expect(priced.price.amount).toBeGreaterThan(0);
    const plain = () => computeAppraisal({ ...input, subject: unseen, model: model() });
    expect(plain).toThrow(/No sale of the evidence has Make "Nobody"/);
  });
});

describe("market movement", () => {
  test("by quarter reads against the first quarter, and holds at the last sale", () => {
    const { appraisal } = run({ market: "quarters" });
    const rows = appraisal.report.coefficients.filter(({ attribute }) => attribute === "market");
    expect(rows.length).toBeGreaterThan(5);
    expect(
      rows.every(({ level, stepWords }) => /^20\d\d Q[1-4]$/.test(level!) && /^against 20\d\d Q/.test(stepWords)),
    ).toBe(true);
    const later = { ...SUBJECT, effectiveOn: "2060-01-01", values: { ...SUBJECT.values, built: "2055-01-01" } };
    const far = { ...later, effectiveOn: "2061-01-01", values: { ...later.values, built: "2056-01-01" } };
    const price = (subject: Subject) =>
      run({ market: "quarters", leftOut: ["built"] }, subject).appraisal.priced!.price;
    expect(price(far).amount).toBe(price(later).amount);
    expect(price(later).marketHeldAt).not.toBeNull();
  });

  test("as a curve fits at least as closely as a line and is one attribute in the built-up", () => {
    const line = run({ market: "line" }).appraisal;
    const curve = run({ market: "spline" }).appraisal;
    expect(curve.report.r2!).toBeGreaterThanOrEqual(line.report.r2! - 1e-12);
    expect(curve.priced!.builtUp.steps.filter(({ key }) => key === "market")).toHaveLength(1);
    expect(curve.ledger.identityError).toBeLessThan(1e-10);
  });
});

describe("products", () => {
  const interactions = [{ a: "hours", b: "make" }];

  test("enter beside both, leave with either, and are not known with either", () => {
    const whole = run({ interactions });
    expect(whole.appraisal.report.attributes).toContain("hours*make");
    expect(run({ interactions, leftOut: ["hours"] }).appraisal.report.attributes).not.toContain("hours*make");
    const subject = { ...SUBJECT, values: { ...SUBJECT.values, make: null } };
    const { appraisal } = run({ interactions }, subject);
    expect(appraisal.report.attributes).not.toContain("hours*make");
    expect(appraisal.priced!.notKnown.map(({ key }) => key)).toEqual(["make"]);
  });

  test("price the subject as the fitted value of a sale with its values", () => {
    const { fit } = run({ interactions, market: "none" });
    const at = fit.design.rows[50]!;
    const values = {
      hours: SALES.values.hours![at]!,
      pull: SALES.values.pull![at]!,
      make: CLASS.attributes[3]!.levels[SALES.values.make![at]!]!,
      remote: SALES.values.remote![at] === 1,
      built: new Date(SALES.values.built![at]! * 86_400_000).toISOString().slice(0, 10),
      channel: SALES.channels.at(at)!,
    };
    const last = new Date(Math.max(...SALES.soldOn) * 86_400_000).toISOString().slice(0, 10);
    const subject = { ...SUBJECT, values, effectiveOn: last };
    const { appraisal } = run({ interactions, market: "none", leftOut: ["built"] }, subject);
    const again = run({ interactions, market: "none", leftOut: ["built"] }, null);
    const fitted = again.fit.design.response[50]! - again.fit.solution.residuals[50]!;
    expect(appraisal.priced!.price.fitted).toBeCloseTo(fitted, 10);
  });
});

describe("recency", () => {
  test("halves a sale's weight with each half-life, at a mean of one, and says so", () => {
    const { fit, appraisal } = run({ halfLifeMonths: 12 });
    const weights = fit.design.weights!;
    expect(weights.reduce((sum, one) => sum + one, 0) / weights.length).toBeCloseTo(1, 12);
    const { soldOn, n } = fit.design;
    const months = (soldOn[n - 1]! - soldOn[0]!) / (365.2425 / 12);
    expect(weights[0]! / weights[n - 1]!).toBeCloseTo(0.5 ** (months / 12), 12);
    expect(appraisal.report.fitted!.notes.at(-1)).toMatch(/counts half for every 12 months/);
    expect(appraisal.report.fitted!.errorsSentence).toMatch(/preferences/);
    expect(appraisal.ledger.identityError).toBeLessThan(1e-10);
  });

  test("of an endless half-life changes no price", () => {
    const plain = run({}).appraisal.priced!.price.amount;
    expect(run({ halfLifeMonths: 1e9 }).appraisal.priced!.price.amount / plain).toBeCloseTo(1, 6);
  });
});

describe("blends", () => {
  const blend = (weighting: "equal" | "firstComponent" | "own") => ({
    blends: [
      {
        key: "blend_wear",
        label: "Wear",
        weighting,
        members: [
          { key: "hours", sign: 1 as const, weight: 3 },
          { key: "built", sign: 1 as const, weight: 1 },
        ],
      },
    ],
  });

  test("enter in place of their members, one column with mean zero", () => {
    for (const weighting of ["equal", "firstComponent", "own"] as const) {
      const { appraisal, fit } = run(blend(weighting));
      expect(appraisal.report.attributes).toContain("blend_wear");
      expect(appraisal.report.attributes).not.toContain("hours");
      const column = fit.design.columns.find(({ attribute }) => attribute === "blend_wear")!;
      expect(column.mean).toBeCloseTo(0, 10);
    }
  });

  test("of two alike members have equal loadings, so the first component is the equal blend", () => {
    const equal = run(blend("equal")).appraisal.priced!.price.amount;
    expect(run(blend("firstComponent")).appraisal.priced!.price.amount).toBeCloseTo(equal, 6);
    expect(run(blend("own")).appraisal.priced!.price.amount).not.toBeCloseTo(equal, 0);
  });

  test("are not known when a member is not, and refuse members that do not vary", () => {
    const subject = { ...SUBJECT, values: { ...SUBJECT.values, hours: null } };
    const { appraisal } = run(blend("equal"), subject);
    expect(appraisal.report.leftOut.map(({ key }) => key)).toContain("blend_wear");
    const values = { ...SALES.values, hours: new Float64Array(200).fill(5) };
    expect(() => run(blend("equal"), null, { ...SALES, values })).toThrow(/Hours has the same value in every sale/);
  });
});

describe("what is said rather than passed over", () => {
  const levels = ["other", "Quern", "Tessaly", "Fenwold", "Ostrand"];
  const assetClass = {
    ...CLASS,
    attributes: CLASS.attributes.map((one) => (one.key === "make" ? { ...one, levels } : one)),
  };
  const rareMakes = (fenwold: number, ostrand: number) => {
    const make = SALES.values.make!.map((level, i) => (i < fenwold ? 3 : i < fenwold + ostrand ? 4 : level));
    return { ...SALES, values: { ...SALES.values, make } };
  };
  const notes = (change: Partial<PriceModel>, columns: SaleColumns = SALES) =>
    computeAppraisal({ assetClass, sales: columns, model: model(change), subject: null, levels: [0.9] }).fit.design
      .notes;

  test("merged levels take a name that no level has", () => {
    const input = { assetClass, sales: rareMakes(3, 2), subject: null, levels: [0.9] };
    const { fit } = computeAppraisal({
      ...input,
      model: model(withForm("make", { rare: "merge", reference: "Quern" })),
    });
    const names = fit.groups
      .find(({ key }) => key === "make")!
      .columns.map((index) => fit.design.columns[index]!.level);
    expect(names.sort()).toEqual(["Tessaly", "other", "other levels"]);
  });

  test("a single rare level, and a reference level that was merged away", () => {
    expect(notes(withForm("make", { rare: "merge" }), rareMakes(3, 0))[0]).toMatch(
      /only Fenwold has fewer than 5 sales/,
    );
    const gone = notes(withForm("make", { rare: "merge", reference: "Ostrand" }), rareMakes(3, 2));
    expect(gone.at(-1)).toBe("Make: Ostrand is not there to be read against; the most frequent level stands in.");
  });

  test("a product with itself or twice is left out with a sentence", () => {
    const twice = notes({
      interactions: [
        { a: "hours", b: "pull" },
        { a: "pull", b: "hours" },
        { a: "pull", b: "pull" },
      ],
    });
    expect(twice).toEqual([
      "The product of Pull and Hours is left out: it is in already.",
      "The product of Pull and Pull is left out: an attribute with itself is a matter of its form.",
    ]);
  });

  test("a blend of what is no number, or of one attribute twice, is refused", () => {
    const member = (key: string) => ({ key, sign: 1 as const, weight: 1 });
    const blend = (key: string, members: string[]) => ({
      key,
      label: key,
      weighting: "equal" as const,
      members: members.map(member),
    });
    expect(() => notes({ blends: [blend("blend_a", ["hours", "make"])] })).toThrow(/Make is not a number/);
    expect(() => notes({ blends: [blend("blend_a", ["hours", "pull"]), blend("blend_b", ["pull", "built"])] })).toThrow(
      /Pull is in the blend blend_a already/,
    );
  });

  test("a blend goes out with one of its members", () => {
    const blends = [
      {
        key: "blend_wear",
        label: "Wear",
        weighting: "equal" as const,
        members: [
          { key: "hours", sign: 1 as const, weight: 1 },
          { key: "built", sign: 1 as const, weight: 1 },
        ],
      },
    ];
    const { appraisal } = run({ blends, leftOut: ["hours"] });
    expect(appraisal.report.attributes).not.toContain("blend_wear");
    expect(appraisal.report.leftOut.map(({ sentence }) => sentence)).toContain(
      "Wear is left out, as one of its attributes is.",
    );
  });

  test("a half-life too short for any sale is refused in words", () => {
    const subject = { ...SUBJECT, effectiveOn: "2060-01-01" };
    expect(() => run({ halfLifeMonths: 0.1 }, subject)).toThrow(/halve every 0.1 months no sale is left/);
  });
});
