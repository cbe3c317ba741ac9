import BetterSqlite3 from "better-sqlite3";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { dayNumber } from "../../src/domain/day.ts";
import type { NewSale, Sale } from "../../src/domain/sale.ts";
import { textsOf } from "../../src/domain/sale.ts";
import type { Store } from "../../src/store/openStore.ts";
import { countSql, pageSql, type RegisterFilter, type RegisterQuery } from "../../src/store/register.ts";
import { attribute, fill, freshStore, HOISTS, sale } from "./filledStore.ts";

const ALL: RegisterFilter = {
  search: "",
  soldFrom: null,
  soldTo: null,
  channels: null,
  state: "any",
  verified: "any",
  batchId: null,
  values: {},
};

function query(
  classId: number,
  change: Partial<RegisterQuery> = {},
  filter: Partial<RegisterFilter> = {},
): RegisterQuery {
  return {
    classId,
    offset: 0,
    limit: 50,
    sort: { by: "id", descending: false },
    ...change,
    filter: { ...ALL, ...filter },
  };
}

function idsOf(store: Store, asked: RegisterQuery): number[] {
  return store.sales.listSales(asked).rows.map(({ id }) => id);
}

const FIVE: NewSale[] = [
  sale({
    title: "alpha",
    soldOn: "2024-01-01",
    priceMinor: 500,
    values: { hours: 900, make: "Corvane", cabin: true, built: "2020-01-01" },
  }),
  sale({
    title: "Beta",
    soldOn: "2025-01-01",
    priceMinor: 400,
    channel: "dealer",
    reference: "L-7",
    values: { hours: null, make: "Brannock", cabin: false },
  }),
  sale({
    title: "gamma 50%",
    soldOn: "2023-01-01",
    priceMinor: 300,
    source: "autumn list",
    values: { hours: 100, built: "2013-01-01" },
  }),
  sale({
    title: "Delta",
    soldOn: "2025-06-01",
    priceMinor: 200,
    notes: "bent boom",
    values: { hours: 900, make: "Corvane" },
  }),
  sale({ title: "epsilon", soldOn: "2022-01-01", priceMinor: 100, values: { hours: 5000.5, make: "Brannock" } }),
];

describe("sales in the store", () => {
  it("come back as they went in, with nothing known where nothing was said", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    const [first, second] = store.sales.findSales(classId, [1, 2]) as [Sale, Sale];
    expect(first).toEqual({ ...FIVE[0], id: 1, batchId: null, fileRow: null, verification: null, setAside: null });
    expect(second.values).toEqual({ hours: null, make: "Brannock", cabin: false, built: null });
  });

  it("keep every finite number, day and basis exactly", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const anySale = fc.record({
      priceMinor: fc.integer({ min: 1, max: Number.MAX_SAFE_INTEGER }),
      soldOn: fc.constantFrom("1931-02-28", "1969-12-31", "1970-01-01", "2024-02-29", "2099-12-31"),
      premium: fc.constantFrom("in" as const, "out" as const, "none" as const),
      tax: fc.constantFrom("in" as const, "out" as const),
      channel: fc.constantFrom("auction" as const, "dealer" as const, "private" as const, "asking" as const),
      hours: fc.oneof(fc.constant(null), fc.double({ noNaN: true, noDefaultInfinity: true })),
      title: fc.string(),
    });
    fc.assert(
      fc.property(anySale, (given) => {
        const { premium, tax, hours, ...plain } = given;
        const wanted = sale({
          ...plain,
          priceBasis: { premium, tax },
          values: { hours, make: null, cabin: null, built: null },
        });
        const [id] = store.transaction(() =>
          store.sales.insertSales(classId, null, [{ row: null, sale: wanted, cells: null }]),
        );
        const {
          id: _id,
          batchId: _b,
          fileRow: _f,
          verification: _v,
          setAside: _s,
          ...found
        } = store.sales.findSales(classId, [id!])[0]!;
        // SQLite keeps no sign of zero; no price depends on it.
        expect(found).toEqual({ ...wanted, values: { ...wanted.values, hours: hours === null ? null : hours + 0 } });
      }),
      { numRuns: 60 },
    );
  });

  it("are refused, whole, when a value can't be held", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const put = (values: NewSale["values"]) => () =>
      store.transaction(() =>
        store.sales.insertSales(
          classId,
          null,
          [sale(), sale({ values })].map((each) => ({ row: null, sale: each, cells: null })),
        ),
      );
    expect(put({ make: "Dunmere" })).toThrow("Dunmere");
    expect(put({ hours: Number.NaN })).toThrow("Hours");
    expect(put({ hours: "many" })).toThrow("Hours");
    expect(put({ cabin: 1 })).toThrow("Cabin");
    expect(put({ built: "2025-02-30" })).toThrow("Built");
    expect(put({ colour: "red" })).toThrow("colour");
    expect(store.assetClasses.summary(classId).saleCount).toBe(0);
  });

  it("raise the class's data version with every change", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    const versions = [store.assetClasses.dataVersion(classId)];
    const acts = [
      () => store.sales.setAside(classId, [1], "A", "2026-01-01", "burnt"),
      () => store.sales.verify(classId, [1], "A", "2026-01-01", "invoice"),
      () => store.sales.putBack(classId, [1]),
      () => store.attributes.insert(classId, attribute("lift")),
      () => store.attributes.archive(classId, "lift", true),
    ];
    for (const act of acts) {
      store.transaction(act);
      versions.push(store.assetClasses.dataVersion(classId));
    }
    expect(versions.every((version, at) => at === 0 || version > versions[at - 1]!)).toBe(true);
  });
});

describe("setting aside, putting back, verifying", () => {
  it("say how many changed and leave other classes alone", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    expect(store.sales.setAside(classId, [1, 2, 99], "A", "2026-01-01", "burnt")).toBe(2);
    expect(store.sales.setAside(classId, [2, 3], "B", "2026-01-02", "forced sale")).toBe(1);
    expect(store.sales.setAside(classId + 1, [4], "B", "2026-01-02", "forced sale")).toBe(0);
    expect(store.sales.findSales(classId, [2])[0]!.setAside).toEqual({ by: "A", on: "2026-01-01", reason: "burnt" });
    expect(idsOf(store, query(classId, {}, { state: "in" }))).toEqual([4, 5]);
    expect(idsOf(store, query(classId, {}, { state: "setAside" }))).toEqual([1, 2, 3]);
    expect(store.sales.putBack(classId, [1, 4])).toBe(1);
    expect(store.sales.verify(classId, [5], "A", "2026-01-03", "invoice")).toBe(1);
    expect(store.sales.findSales(classId, [5])[0]!.verification).toEqual({ by: "A", on: "2026-01-03", how: "invoice" });
    expect(idsOf(store, query(classId, {}, { verified: "yes" }))).toEqual([5]);
    expect(idsOf(store, query(classId, {}, { verified: "no" }))).toEqual([1, 2, 3, 4]);
  });
});

describe("the register", () => {
  const store = () => {
    const made = freshStore();
    return { made, classId: fill(made, FIVE) };
  };

  it("sorts by built-in columns and attributes, not known last, ties by number", () => {
    const { made, classId } = store();
    const sorted = (by: string, descending = false) => idsOf(made, query(classId, { sort: { by, descending } }));
    expect(sorted("id", true)).toEqual([5, 4, 3, 2, 1]);
    expect(sorted("soldOn")).toEqual([5, 3, 1, 2, 4]);
    expect(sorted("price", true)).toEqual([1, 2, 3, 4, 5]);
    expect(sorted("title")).toEqual([1, 2, 4, 5, 3]);
    expect(sorted("hours")).toEqual([3, 1, 4, 5, 2]);
    expect(sorted("hours", true)).toEqual([5, 4, 1, 3, 2]);
    expect(sorted("make")).toEqual([2, 5, 1, 4, 3]);
    expect(sorted("reference")).toEqual([2, 1, 3, 4, 5]);
    expect(sorted("channel", true)[0]).toBe(2);
    expect(sorted("verified")).toEqual([1, 2, 3, 4, 5]);
    expect(sorted("state")).toEqual([1, 2, 3, 4, 5]);
    expect(() => sorted("colour")).toThrow("colour");
  });

  it("filters by day, channel, text and values, and counts the hits", () => {
    const { made, classId } = store();
    const hits = (filter: Partial<RegisterFilter>) => idsOf(made, query(classId, {}, filter));
    const value = (
      low: number | null,
      high: number | null,
      levels: string[] | null = null,
      missing: boolean | null = null,
    ) => ({ low, high, levels, missing });
    expect(hits({ soldFrom: "2024-01-01", soldTo: "2025-01-01" })).toEqual([1, 2]);
    expect(hits({ channels: ["dealer", "asking"] })).toEqual([2]);
    expect(hits({ channels: [] })).toEqual([]);
    expect(hits({ search: "BETA" })).toEqual([2]);
    expect(hits({ search: "50%" })).toEqual([3]);
    expect(hits({ search: "_" })).toEqual([]);
    expect(hits({ search: "autumn" })).toEqual([3]);
    expect(hits({ search: "bent" })).toEqual([4]);
    expect(hits({ search: "l-7" })).toEqual([2]);
    expect(hits({ values: { hours: value(100, 900) } })).toEqual([1, 3, 4]);
    expect(hits({ values: { hours: value(1000, null, null, true) } })).toEqual([2, 5]);
    expect(hits({ values: { hours: value(null, null, null, true) } })).toEqual([2]);
    expect(hits({ values: { make: value(null, null, ["Corvane", "Nobody"]) } })).toEqual([1, 4]);
    expect(hits({ values: { make: value(null, null, null, false) } })).toEqual([1, 2, 4, 5]);
    expect(hits({ values: { cabin: value(null, null, ["no"]) } })).toEqual([2]);
    expect(hits({ values: { built: value(3, 5) } })).toEqual([1]);
    expect(hits({ values: { built: value(5, null) } })).toEqual([3]);
    expect(
      hits({ soldFrom: "2024-01-01", values: { make: value(null, null, ["Corvane"]), hours: value(900, 900) } }),
    ).toEqual([1, 4]);
    expect(
      made.sales.listSales(query(classId, { limit: 2, offset: 1 }, { values: { hours: value(100, 900) } })),
    ).toMatchObject({
      total: 3,
      rows: [{ id: 3 }, { id: 4 }],
    });
  });

  it("gives the same order whether it walks the index or collects the hits", () => {
    const made = freshStore();
    const many = Array.from({ length: 300 }, (_, i) =>
      sale({
        priceMinor: 1 + ((i * 7919) % 97),
        values: { hours: i % 11 === 0 ? null : (i * 31) % 53, make: i % 3 === 0 ? "Brannock" : "Corvane" },
      }),
    );
    const classId = fill(made, many);
    const db = new BetterSqlite3(made.path, { readonly: true });
    const stored = made.attributes.listStored(classId);
    const filter = {
      soldTo: "2025-12-31",
      values: { make: { low: null, high: null, levels: ["Corvane"], missing: null } },
    };
    for (const by of ["price", "hours", "make", "soldOn", "id", "state"]) {
      for (const descending of [true, false]) {
        const asked = query(classId, { sort: { by, descending }, limit: 40, offset: 130 }, filter);
        const run = (total: number) => {
          const { sql, params } = pageSql(asked, stored, total);
          return db
            .prepare(sql)
            .pluck()
            .all(...params);
        };
        expect(run(1_000_000), `${by} ${descending}`).toEqual(run(1));
        expect(run(1)).toEqual(idsOf(made, asked));
        expect(run(1)).toHaveLength(40);
      }
    }
    db.close();
  });

  it("finds a page along an index, without sorting all sales", () => {
    const { made, classId } = store();
    const db = new BetterSqlite3(made.path, { readonly: true });
    const stored = made.attributes.listStored(classId);
    const planOf = (sql: string, params: readonly unknown[]) =>
      (db.prepare(`EXPLAIN QUERY PLAN ${sql}`).all(...params) as { detail: string }[])
        .map(({ detail }) => detail)
        .join("; ");
    const filter: Partial<RegisterFilter> = {
      soldFrom: "2024-01-01",
      values: { make: { low: null, high: null, levels: ["Corvane"], missing: null } },
    };
    const keys = {
      soldOn: "sales_by_sold_on",
      price: "sales_by_price",
      title: "sales_by_title",
      reference: "sales_by_reference",
      channel: "sales_by_channel",
      verified: "sales_by_verified",
      state: "sales_by_set_aside",
      hours: "by_v1",
      make: "by_v2",
      cabin: "by_v3",
      built: "by_v4",
      id: "sale_values_1|v",
    };
    for (const [by, index] of Object.entries(keys)) {
      for (const descending of [true, false]) {
        const { sql, params } = pageSql(query(classId, { sort: { by, descending } }, filter), stored, 1_000_000);
        expect(planOf(sql, params), by).toMatch(new RegExp(index));
        expect(planOf(sql, params), by).not.toContain("TEMP B-TREE");
      }
    }
    const count = countSql(
      { ...ALL, soldFrom: "2024-01-01", channels: ["auction"], state: "in", verified: "no" },
      classId,
      stored,
    );
    expect(planOf(count.sql, count.params)).toContain("COVERING INDEX sales_by_sold_on");
    db.close();
  });
});

describe("sales as columns", () => {
  it("hold every sale in the order of its number, NaN where nothing is known", () => {
    const store = freshStore();
    const classId = fill(store, [
      ...FIVE,
      sale({ currencyCode: "JPY", priceMinor: 77, soldOn: "1969-12-31", priceBasis: { premium: "none", tax: "in" } }),
    ]);
    store.sales.setAside(classId, [2, 4], "A", "2026-01-01", "burnt");
    store.sales.verify(classId, [3], "A", "2026-01-01", "invoice");
    const columns = store.sales.readColumns(classId);
    expect(columns.count).toBe(6);
    expect([...columns.ids]).toEqual([1, 2, 3, 4, 5, 6]);
    expect([...columns.price]).toEqual([5, 4, 3, 2, 1, 77]);
    expect([...columns.soldOn]).toEqual([19723, 20089, 19358, 20240, 18993, -1]);
    expect(textsOf(columns.titles)).toEqual(["alpha", "Beta", "gamma 50%", "Delta", "epsilon", "Brannock H2"]);
    expect(textsOf(columns.references)).toEqual([null, "L-7", null, null, null, null]);
    expect(textsOf(columns.channels)).toEqual(["auction", "dealer", "auction", "auction", "auction", "auction"]);
    expect(columns.sources.at(2)).toBe("autumn list");
    expect(textsOf(columns.currencyCodes)).toEqual(["EUR", "EUR", "EUR", "EUR", "EUR", "JPY"]);
    expect(columns.priceBases.at(0)).toBe("premium in, tax out");
    expect(columns.priceBases.at(5)).toBe("no premium, tax in");
    expect([...columns.verified]).toEqual([0, 0, 1, 0, 0, 0]);
    expect(textsOf(columns.setAsideReasons)).toEqual([null, "burnt", null, "burnt", null, null]);
    expect([...columns.values.hours!]).toEqual([900, Number.NaN, 100, 900, 5000.5, Number.NaN]);
    expect([...columns.values.make!]).toEqual([1, 0, Number.NaN, 1, 0, Number.NaN]);
    expect([...columns.values.cabin!]).toEqual([1, 0, Number.NaN, Number.NaN, Number.NaN, Number.NaN]);
    expect(columns.values.built![0]).toBe(18262);
  });

  it("hold every choice, yes/no and built day exactly, however many cross in one number", () => {
    const store = freshStore();
    const levels = Array.from({ length: 300 }, (_, i) => `level ${i}`);
    const kinds = ["choice", "built", "yesNo", "built", "choice", "number", "built", "yesNo", "choice"] as const;
    const attributes = kinds.map((kind, k) => attribute(`a${k}`, { kind, levels: kind === "choice" ? levels : [] }));
    const { id: classId } = store.assetClasses.insert({ ...HOISTS, attributes });
    const day = fc.constantFrom("0101-01-01", "1899-12-31", "1969-12-31", "1970-01-01", "2024-02-29", "9999-12-31");
    const anyOf = {
      choice: fc.constantFrom(...levels),
      built: day,
      yesNo: fc.boolean(),
      number: fc.double({ noNaN: true, noDefaultInfinity: true }),
    };
    const anyValues = fc.tuple(...kinds.map((kind) => fc.oneof(fc.constant(null), anyOf[kind])));
    fc.assert(
      fc.property(fc.array(anyValues, { minLength: 1, maxLength: 20 }), (rows) => {
        const incoming = rows.map((row) =>
          sale({ values: Object.fromEntries(row.map((value, k) => [`a${k}`, value])) }),
        );
        const ids = store.sales.insertSales(
          classId,
          null,
          incoming.map((each) => ({ row: null, sale: each, cells: null })),
        );
        const columns = store.sales.readColumns(classId);
        for (const [r, row] of rows.entries()) {
          const i = columns.ids.indexOf(ids[r]!);
          for (const [k, kind] of kinds.entries()) {
            const value = row[k]!;
            const wanted =
              value === null
                ? Number.NaN
                : kind === "choice"
                  ? levels.indexOf(value as string)
                  : kind === "built"
                    ? dayNumber(value as string)!
                    : Number(value) + 0;
            expect(columns.values[`a${k}`]![i]).toBe(wanted);
          }
        }
      }),
      { numRuns: 30 },
    );
  });

  it("are empty for an empty class, and follow a change at once", () => {
    const store = freshStore();
    const classId = fill(store, []);
    expect(store.sales.readColumns(classId).count).toBe(0);
    store.sales.insertSales(classId, null, [{ row: null, sale: sale(), cells: null }]);
    expect(store.sales.readColumns(classId).count).toBe(1);
    expect(store.sales.readColumns(classId)).toBe(store.sales.readColumns(classId));
    store.sales.setAside(classId, [1], "A", "2026-01-01", "burnt");
    expect(textsOf(store.sales.readColumns(classId).setAsideReasons)).toEqual(["burnt"]);
  });

  it("keep two classes in one store apart", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    const other = store.assetClasses.insert({
      name: "Boats (invented)",
      itemWord: "boat",
      currencyCode: "EUR",
      priceBasis: { premium: "none", tax: "in" },
      invented: true,
      attributes: [attribute("length_m", { label: "Length", unit: "m" })],
    });
    store.sales.insertSales(other.id, null, [
      { row: null, sale: sale({ title: "boat", values: { length_m: 9.5 } }), cells: null },
    ]);
    store.sales.insertSales(classId, null, [{ row: null, sale: sale({ title: "zeta" }), cells: null }]);
    expect(textsOf(store.sales.readColumns(classId).titles)).toEqual([
      "alpha",
      "Beta",
      "gamma 50%",
      "Delta",
      "epsilon",
      "zeta",
    ]);
    expect([...store.sales.readColumns(other.id).values.length_m!]).toEqual([9.5]);
    expect(idsOf(store, query(other.id, { sort: { by: "price", descending: false } }))).toEqual([6]);
    expect(store.sales.findSales(other.id, [1])).toEqual([]);
  });

  it("take a hundred thousand sales in and out again within seconds, all indexes in place", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    const many = Array.from({ length: 100_000 }, (_, i) => ({
      row: i + 2,
      sale: sale({
        priceMinor: 1000 + i,
        reference: `L-${i}`,
        values: { hours: i % 9000, make: i % 2 === 0 ? "Brannock" : "Corvane" },
      }),
      cells: null,
    }));
    const from = performance.now();
    store.transaction(() => store.sales.insertSales(classId, null, many));
    const inserted = performance.now();
    const columns = store.sales.readColumns(classId);
    const read = performance.now();
    expect(columns.count).toBe(100_005);
    expect(columns.values.hours![100_004]).toBe(99_999 % 9000);
    // About 1 s and 0.2 s on two quiet cores; the limits leave room for a busy machine.
    expect(inserted - from).toBeLessThan(20_000);
    expect(read - inserted).toBeLessThan(5_000);
    const page = store.sales.listSales(
      query(
        classId,
        { sort: { by: "price", descending: true } },
        { values: { make: { low: null, high: null, levels: ["Brannock"], missing: null } } },
      ),
    );
    expect(page.total).toBe(50_002);
    expect(page.rows[0]!.priceMinor).toBe(100_998);
  });
});

describe("attributes of a class with sales", () => {
  it("can be added later: not known everywhere, then filled", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    store.attributes.insert(classId, attribute("lift", { label: "Lift height", unit: "m" }));
    store.sales.insertSales(classId, null, [{ row: null, sale: sale({ values: { lift: 7 } }), cells: null }]);
    expect([...store.sales.readColumns(classId).values.lift!]).toEqual([...FIVE.map(() => Number.NaN), 7]);
    expect(store.assetClasses.get(classId).attributes.map(({ key }) => key)).toEqual([
      "hours",
      "make",
      "cabin",
      "built",
      "lift",
    ]);
  });

  it("keep the value of every sale when levels are added, put in another order or taken away unused", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    const makes = () => store.sales.findSales(classId, [1, 2, 3, 4, 5]).map(({ values }) => values.make);
    const before = makes();
    const [, make] = store.attributes.list(classId);
    store.attributes.addLevels(classId, "make", ["Eskdal", "Brannock", "Eskdal"]);
    expect(store.attributes.list(classId)[1]!.levels).toEqual(["Brannock", "Corvane", "Eskdal"]);
    store.attributes.change(classId, "make", { ...make!, levels: ["Dunmere", "Corvane", "Brannock"] });
    expect(makes()).toEqual(before);
    expect([...store.sales.readColumns(classId).values.make!]).toEqual([1, 2, Number.NaN, 1, 2]);
    expect(() => store.attributes.change(classId, "make", { ...make!, levels: ["Brannock"] })).toThrow("2 sales have");
  });

  it("refuse a second one of the same name, another kind and a level twice", () => {
    const store = freshStore();
    const classId = fill(store, []);
    expect(() => store.attributes.insert(classId, attribute("hours"))).toThrow("already");
    expect(() => store.attributes.insert(classId, attribute("hours_2", { label: " hours" }))).toThrow("already");
    expect(() => store.attributes.change(classId, "hours", attribute("hours", { kind: "yesNo" }))).toThrow(
      "kind of Hours",
    );
    expect(() => store.attributes.insert(classId, attribute("grade", { kind: "choice", levels: ["a", "a"] }))).toThrow(
      "twice",
    );
    expect(() => store.attributes.change(classId, "nothing", attribute("nothing"))).toThrow("no attribute");
  });

  it("keep their values while archived", () => {
    const store = freshStore();
    const classId = fill(store, FIVE);
    store.attributes.archive(classId, "hours", true);
    expect(store.assetClasses.get(classId).attributes[0]!.archived).toBe(true);
    expect(store.assetClasses.summary(classId).attributeCount).toBe(3);
    expect(store.sales.readColumns(classId).values.hours![0]).toBe(900);
  });

  it("belong to a class whose name is taken only once, whatever the case", () => {
    const store = freshStore();
    fill(store, []);
    expect(() => store.transaction(() => fill(store, []))).toThrow("already");
    expect(store.assetClasses.findByName("HOISTS (INVENTED)")).toBe(1);
    expect(store.assetClasses.findByName("Boats")).toBeNull();
    expect(() => store.assetClasses.get(9)).toThrow("no such asset class");
  });
});
