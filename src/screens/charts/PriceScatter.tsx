/** Prices of sales over one number attribute: solid dots in the register, hollow ones set aside. A picture of the raw sales, no fit. */
import { CartesianGrid, ResponsiveContainer, Scatter, ScatterChart, Tooltip, XAxis, YAxis } from "recharts";
import { formatMoney, formatNumber } from "../../domain/format.ts";

export interface PricedPoint {
  readonly name: string;
  readonly x: number;
  readonly price: number;
  readonly isSetAside: boolean;
}

export interface PriceScatterProps {
  readonly label: string;
  readonly unit: string | null;
  readonly decimals: number;
  readonly currencyCode: string;
  readonly points: readonly PricedPoint[];
}

export function PriceScatter({ label, unit, decimals, currencyCode, points }: PriceScatterProps) {
  const xWords = (value: number) => `${formatNumber(value, decimals)}${unit === null ? "" : `\u00a0${unit}`}`;
  const kinds = [false, true].map((isSetAside) => points.filter((point) => point.isSetAside === isSetAside));
  const tick = { fill: "var(--soft)", fontSize: 11 };
  return (
    <figure>
      <div role="img" aria-label={`Prices of ${points.length} sales over ${label}; the register lists each of them.`}>
        <ResponsiveContainer width="100%" height={240}>
          <ScatterChart margin={{ top: 8, right: 8, bottom: 4, left: 4 }} accessibilityLayer={false}>
            <CartesianGrid stroke="var(--rule)" vertical={false} />
            <XAxis
              type="number"
              dataKey="x"
              domain={["dataMin", "dataMax"]}
              tick={tick}
              stroke="var(--edge)"
              tickFormatter={(value: number) => formatNumber(value, decimals)}
            />
            <YAxis
              type="number"
              dataKey="price"
              width={62}
              tick={tick}
              stroke="var(--edge)"
              tickFormatter={(value: number) => formatNumber(value)}
            />
            <Tooltip
              isAnimationActive={false}
              content={({ payload }) => {
                const point = payload?.[0]?.payload as PricedPoint | undefined;
                return point === undefined ? null : (
                  <div className="raised small">
                    {point.name}: {formatMoney(point.price, currencyCode)} at {xWords(point.x)}
                    {point.isSetAside ? ", set aside" : ""}
                  </div>
                );
              }}
            />
            {kinds.map((kind, at) => (
              <Scatter
                key={at === 0 ? "in" : "aside"}
                data={[...kind]}
                isAnimationActive={false}
                shape={({ cx, cy }) => (
                  <circle
                    cx={cx}
                    cy={cy}
                    r={2.6}
                    className={at === 0 ? "f-mid s-slate" : "f-paper s-slate"}
                    fillOpacity={at === 0 ? 0.55 : 1}
                  />
                )}
              />
            ))}
          </ScatterChart>
        </ResponsiveContainer>
      </div>
      <figcaption className="fine soft">
        {currencyCode} over {label}
        {unit === null ? "" : `, ${unit}`}; hollow: set aside. As recorded, whatever else differs between the sales.
      </figcaption>
    </figure>
  );
}
