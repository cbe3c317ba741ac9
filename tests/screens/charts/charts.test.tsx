import fc from "fast-check";
import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, test } from "vitest";
import { formatMoney, roundTo } from "../../../src/domain/format.ts";
import { BuiltUpSteps } from "../../../src/screens/charts/BuiltUpSteps.tsx";
import { barScale, barTicks } from "../../../src/screens/charts/CarryOverBars.tsx";
import { EvidenceHairline } from "../../../src/screens/charts/EvidenceHairline.tsx";
import { priceStep } from "../../../src/screens/charts/figures.ts";
import { BOX_HEIGHT, layoutMap } from "../../../src/screens/charts/layoutMap.ts";
import { RangeGauge } from "../../../src/screens/charts/RangeGauge.tsx";
import { rulerAround, shortAmount, ticksOf } from "../../../src/screens/charts/ruler.ts";
import { demoBench } from "../demoBench.ts";
import { wordsOf } from "../draw.tsx";

describe("the ruler", () => {
  test("holds what it is drawn around, never below zero, with numbered ticks at round amounts", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1000, max: 1e7, noNaN: true }),
        fc.double({ min: 1.01, max: 5, noNaN: true }),
        (low, by) => {
          const ruler = rulerAround([{ level: 0.9, low, high: low * by }]);
          expect(ruler.low).toBeGreaterThanOrEqual(0);
          expect(ruler.low).toBeLessThanOrEqual(low);
          expect(ruler.high).toBeGreaterThanOrEqual(low * by);
          const ticks = ticksOf(ruler, 900, 84);
          expect(ticks.length).toBeGreaterThan(5);
          for (const tick of ticks) expect(tick.at).toBeGreaterThanOrEqual(0);
        },
      ),
    );
  });
  test("shortens thousands only where they are exact", () => {
    expect(shortAmount(35_000)).toBe("35k");
    expect(shortAmount(2_500)).toBe("2.5k");
    expect(shortAmount(250)).toBe("250");
  });
});

describe("pictures of a price", () => {
  test("the gauge names price, both ranges and the average", async () => {
    const { price } = (await demoBench()).appraisal!.priced!;
    const html = renderToStaticMarkup(<RangeGauge price={price} currencyCode="EUR" level={0.9} />);
    const name = /aria-label="([^"]*)"/.exec(html)![1]!;
    expect(name).toContain(formatMoney(roundTo(price.amount, priceStep(price)), "EUR"));
    expect(name).toContain("Range for one sale: 9 in 10");
    expect(name).toContain("1 in 2");
    expect(name).toContain("Range for the average");
  });

  test("the gauge says so when no range can be given", async () => {
    const { price } = (await demoBench()).appraisal!.priced!;
    const bare = { ...price, rangeForOneSale: [], rangeForAverage: [] };
    const html = renderToStaticMarkup(<RangeGauge price={bare} currencyCode="EUR" level={0.9} />);
    expect(html).toContain("No range for one sale can be given.");
    expect(html).not.toContain("NaN");
  });

  test("the printed steps end at the printed price, its rounding said", async () => {
    const { builtUp, price } = (await demoBench()).appraisal!.priced!;
    const step = priceStep(price);
    const html = renderToStaticMarkup(
      <BuiltUpSteps builtUp={builtUp} saleCount={597} subject="TH-740" currencyCode="EUR" priceStep={step} />,
    );
    const figures = [...html.matchAll(/<td class="num[^"]*"[^>]*>([^<]*)<\/td>/g)].map(([, text]) =>
      Number(text!.replace("−", "-").replace(/[^\d.-]/g, "")),
    );
    expect(figures.slice(0, -1).reduce((sum, part) => sum + part, 0)).toBe(figures.at(-1));
    expect(figures.at(-1)).toBe(roundTo(price.amount, step));
    expect(wordsOf(html)).not.toContain("NaN");
  });
});

describe("other pictures", () => {
  const spread = { low: 0, q1: 2, median: 3, q3: 5, high: 10, mean: 4 };
  test("a hairline says that a value lies beyond the evidence, and never draws outside itself", () => {
    const html = renderToStaticMarkup(<EvidenceHairline label="Hours" spread={spread} value={40} decimals={0} />);
    expect(html).toContain("40, beyond the evidence");
    expect(html).toContain("s-brick");
  });
  test("a hairline of equal values has a place for them", () => {
    const flat = { low: 3, q1: 3, median: 3, q3: 3, high: 3, mean: 3 };
    expect(renderToStaticMarkup(<EvidenceHairline label="A" spread={flat} value={3} decimals={0} />)).not.toContain(
      "NaN",
    );
  });
  test("bars of opposite sign share a scale that holds every running total and zero", () => {
    const scale = barScale([[-700, -1400, 300], [900]], 300);
    expect(scale).toMatchObject({ low: -2100, high: 900 });
    expect(barTicks(scale)).toContain(0);
  });
  test("no two boxes of the map overlap, with up to fifteen attributes, and the same ties give the same map", () => {
    const boxes = Array.from({ length: 15 }, (_, k) => ({ key: `k${k}`, width: 50 + 7 * (k % 6) }));
    const ties = Array.from({ length: 14 }, (_, k) => ({
      a: `k${k}`,
      b: `k${(k * 3 + 1) % 15}`,
      strength: 0.1 + 0.05 * k,
    }));
    const map = layoutMap(boxes, ties, 480);
    for (const [i, a] of map.boxes.entries()) {
      for (const b of map.boxes.slice(i + 1)) {
        const isApart = Math.abs(a.x - b.x) >= (a.width + b.width) / 2 || Math.abs(a.y - b.y) >= BOX_HEIGHT;
        expect(isApart, `${a.key} and ${b.key}`).toBe(true);
      }
    }
    expect(layoutMap(boxes, ties, 480)).toEqual(map);
  });
});
