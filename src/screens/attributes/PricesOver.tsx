/** The raw sales over one number attribute, the newest first to be drawn; how many are drawn is said. */
import { useCallback } from "react";
import type { Attribute } from "../../domain/attribute.ts";
import { dayNumber, yearsBetween } from "../../domain/day.ts";
import { formatNumber, majorOf } from "../../domain/format.ts";
import type { Sale } from "../../domain/sale.ts";
import { type PricedPoint, PriceScatter } from "../charts/PriceScatter.tsx";
import { Busy, ErrorNote, SectionHeading } from "../parts/index.ts";
import { useRead } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";

/** As many as one page of the register holds. */
const DRAWN = 500;
const EVERY = {
  search: "",
  soldFrom: null,
  soldTo: null,
  channels: null,
  state: "any",
  verified: "any",
  batchId: null,
  values: {},
} as const;

/** A sale as a point, or null when its value is not known. */
export function pointOf(sale: Sale, attribute: Attribute): PricedPoint | null {
  const value = sale.values[attribute.key] ?? null;
  const [built, sold] = [dayNumber(String(value)), dayNumber(sale.soldOn)];
  const x = attribute.kind !== "built" ? value : built === null || sold === null ? null : yearsBetween(built, sold);
  if (typeof x !== "number") return null;
  const name = sale.reference ?? sale.title;
  return { name, x, price: majorOf(sale.priceMinor, sale.currencyCode), isSetAside: sale.setAside !== null };
}

export function PricesOver({ attribute }: { readonly attribute: Attribute }) {
  const { client, classId, assetClass, summary } = useWorkbench();
  const ask = useCallback(
    () =>
      client.ask("listSales", {
        classId: classId!,
        offset: 0,
        limit: DRAWN,
        sort: { by: "soldOn", descending: true },
        filter: { ...EVERY, values: { [attribute.key]: { low: null, high: null, levels: null, missing: false } } },
      }),
    [client, classId, attribute.key],
  );
  const { value, error } = useRead(classId === null ? null : ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null || assetClass === null) return <Busy words="Reading the sales" />;
  const points = value.rows.map((sale) => pointOf(sale, attribute)).filter((point) => point !== null);
  if (points.length === 0) return null;
  const isAll = value.total <= DRAWN;
  return (
    <section aria-labelledby="prices-over">
      <SectionHeading
        id="prices-over"
        aside={
          isAll
            ? `all ${formatNumber(points.length)} that state it`
            : `the newest ${formatNumber(points.length)} of ${formatNumber(summary?.saleCount ?? value.total)}`
        }
      >
        Prices as recorded
      </SectionHeading>
      <PriceScatter
        label={attribute.label}
        unit={attribute.kind === "built" ? "years at sale" : attribute.unit}
        decimals={attribute.kind === "built" ? 0 : attribute.decimals}
        currencyCode={assetClass.currencyCode}
        points={points}
      />
    </section>
  );
}
