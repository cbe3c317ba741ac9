/** Every attribute set on screen: sentence, picture and tables say the numbers of one answer, and nothing else. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../../src/app/handlers.ts";
import type { EverySet } from "../../../src/domain/attributeSets.ts";
import { formatMoney, formatNumber, formatPercent, formatSigned, roundTo } from "../../../src/domain/format.ts";
import type { Subject } from "../../../src/domain/subject.ts";
import { HoldChoices } from "../../../src/screens/appraise/everySet/HoldChoices.tsx";
import { SetsOutcome } from "../../../src/screens/appraise/everySet/SetsOutcome.tsx";
import { SetsPane } from "../../../src/screens/appraise/everySet/SetsPane.tsx";
import { countWithin, fineStepOf } from "../../../src/screens/appraise/everySet/setWords.ts";
import type { EverySetState } from "../../../src/screens/appraise/everySet/useEverySet.ts";
import type { Workbench } from "../../../src/screens/workbench/workbench.ts";
import { openStore } from "../../../src/store/openStore.ts";
import { testPorts } from "../../app/ports.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

const RULE = { kind: "error", share: 0.1 };
let bench: Workbench;
let found: EverySet;
let right: string;
let left: string;

function stateOf(answer: EverySet | null, over: Partial<EverySetState> = {}): EverySetState {
  const nothing = () => undefined;
  return {
    found: answer,
    error: null,
    isAwaited: false,
    share: 0.1,
    setShare: nothing,
    holds: new Map(),
    hold: nothing,
    choose: nothing,
    ...over,
  };
}

beforeAll(async () => {
  bench = await demoBench();
  const handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  const { classId } = await handlers.openDemo({});
  const { model } = await handlers.currentModel({ classId });
  const subject: Subject = (await handlers.loadDraft({ classId }))!.subject;
  found = await handlers.everySet({ classId, model, subject, rule: RULE } as never);
  right = draw(bench, <SetsOutcome bench={bench} state={stateOf(found)} />);
  left = draw(bench, <SetsPane state={stateOf(found)} />);
});

const squeeze = (text: string): string => text.replace(/\s+/g, "");

describe("every attribute set on screen", () => {
  test("opens with the span in words, and the picture's bracket has the same ends", () => {
    const words = wordsOf(right);
    expect(squeeze(words)).toContain(squeeze(found.headline));
    const [low, high] = [...found.headline.matchAll(/€[\d,]+/g)].map(([money]) => money);
    for (const end of [low, high]) expect(squeeze(words).split(end!).length - 1).toBeGreaterThanOrEqual(2);
    expect(words).toContain(`${found.defensible.length} defensible sets`);
  });

  test("is one stop for the keyboard, which reads out the set in use with its price and error", () => {
    const slider = /role="slider"[^>]*/.exec(right)![0];
    expect(slider).toContain('tabindex="0"');
    const price = formatMoney(roundTo(found.marks.price[found.current]!, fineStepOf(found)), "EUR");
    const error = formatPercent(found.marks.error[found.current]!, 1);
    expect(slider).toContain(`all ${found.attributes.length} attributes: ${price}, error ${error}`);
  });

  test("has one row for each coefficient, and says which signs turn as its sentence does", () => {
    const words = wordsOf(right);
    expect(squeeze(words)).toContain(squeeze(found.turns));
    const rows = right
      .slice(right.indexOf("Span of each coefficient"), right.indexOf("Averaged price"))
      .split("<tr>")
      .slice(2);
    expect(rows).toHaveLength(found.coefficients.length);
    found.coefficients.forEach(({ signs, money }, k) => {
      expect(rows[k]!.includes("turns")).toBe(signs.above > 0 && signs.below > 0);
      if (money.now === null) expect(rows[k]).toContain("left out");
    });
  });

  test("shows both averages beside the price of the set in use", () => {
    const words = wordsOf(right);
    const fine = fineStepOf(found);
    for (const price of [found.averaged!.price, found.stacked!.price, found.marks.price[found.current]!])
      expect(words).toContain(formatMoney(roundTo(price, fine), "EUR"));
    expect(words).toContain(found.doubt!);
  });

  test("shows shares that are those of the answer, and calls them spread, not cause", () => {
    const words = wordsOf(right);
    expect(words).toContain("spread in these sales, not cause");
    const { shares, r2 } = found.shares!;
    for (const { label, r2: share } of shares)
      expect(squeeze(words)).toContain(squeeze(`${label} ${formatPercent(share / r2)}`));
  });

  test("lists the sets that weigh most with in and left out in words, and what putting each attribute in does", () => {
    const words = wordsOf(left);
    expect(left.match(/aria-pressed="true"/g)).toHaveLength(1);
    expect(left.match(/left out<\/span>/g)!.length).toBeGreaterThan(3);
    expect(words).toContain(`${formatNumber(2 ** found.attributes.length)} sets, all on the same`);
    const hours = found.switches.find(({ key }) => key === "hours")!;
    expect(words).toContain(formatSigned(roundTo(hours.mean!, 10)));
  });

  test("counts by the marks, while the answer for another share is awaited, what the answer will count", () => {
    expect(countWithin(found, 0.1).count).toBe(found.defensible.length);
    const moved = draw(bench, <SetsOutcome bench={bench} state={stateOf(found, { share: 0.3 })} />);
    expect(wordsOf(moved)).toContain(`${countWithin(found, 0.3).count} defensible sets`);
  });

  test("says a refusal in place of the picture", () => {
    const error = {
      family: "fit",
      code: "too-few-sales",
      what: "Too few sales.",
      where: null,
      whatToDo: null,
    } as const;
    expect(wordsOf(draw(bench, <SetsOutcome bench={bench} state={stateOf(null, { error })} />))).toContain(
      "Too few sales.",
    );
  });
});

describe("attributes held in or out", () => {
  test("are three-way choices for the keyboard, and the sentence says which are held and how many sets are left", async () => {
    const holds = new Map([["hours", "in"] as const, ["built", "out"] as const]);
    const named = (key: string) => found.attributes.filter((one) => one.key === key);
    const rest = found.attributes.filter(({ key }) => !holds.has(key as "hours"));
    const held = { ...found, attributes: rest, heldIn: named("hours"), heldOut: named("built") };
    const drawn = draw(bench, <HoldChoices state={stateOf(held, { holds })} found={held} />);
    expect(drawn.match(/role="radiogroup"/g)).toHaveLength(found.attributes.length);
    expect(drawn.match(/aria-checked="true"[^>]*title="In every set"/g)).toHaveLength(1);
    expect(wordsOf(drawn)).toContain(
      `hours in, age out; ${formatNumber(2 ** rest.length)} sets of the other ${rest.length}`,
    );
  });
});
