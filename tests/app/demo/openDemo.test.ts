import { describe, expect, it } from "vitest";
import { openableDemos } from "../../../src/app/demo/demoClasses.ts";
import { openDemo } from "../../../src/app/openDemo.ts";
import { textsOf } from "../../../src/domain/sale.ts";
import { testPorts } from "../ports.ts";

describe("the demo in a store", () => {
  function opened() {
    const ports = testPorts();
    const { classId } = openDemo(ports, openableDemos());
    return { ports, classId, columns: ports.store.sales.readColumns(classId) };
  }

  it("has its sales, its held-back rows, and a second class of another kind", () => {
    const { ports, classId } = opened();
    expect(ports.store.assetClasses.summary(classId)).toMatchObject({
      name: "Telehandlers",
      saleCount: 640,
      heldBackCount: 9,
    });
    expect(ports.store.assetClasses.list().map(({ name, saleCount }) => [name, saleCount])).toEqual(
      expect.arrayContaining([["Reed organs", 90]]),
    );
  });

  it("has sales set aside with their reasons and verified by two people", () => {
    const { columns } = opened();
    expect(textsOf(columns.setAsideReasons).filter((reason) => reason !== null)).toHaveLength(14);
    expect(new Set(textsOf(columns.setAsideReasons)).size).toBe(5);
    expect(columns.verified.reduce((sum, each) => sum + each, 0)).toBeGreaterThan(350);
    expect(new Set(textsOf(columns.priceBases)).size).toBe(1);
  });

  it("tells it all in an unbroken journal and keeps the subject as a draft", () => {
    const { ports, classId } = opened();
    const acts = ports.store.journal.list(0, 100).map(({ act }) => act);
    expect(acts).toEqual(
      expect.arrayContaining(["class-created", "sales-imported", "sales-set-aside", "sales-verified"]),
    );
    expect(ports.store.drafts.read(classId)?.subject.title).toBe("Tessaly TH-740");
  });

  it("is only found when it is opened again", () => {
    const { ports, classId } = opened();
    const entries = ports.store.journal.count();
    expect(openDemo(ports, openableDemos())).toEqual({ classId });
    expect(ports.store.journal.count()).toBe(entries);
  });
});
