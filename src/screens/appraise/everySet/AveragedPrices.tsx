/** The price averaged over sets in two ways, beside that of the set in use; doubt about the set is in their ranges. */
import type { AveragedPrice, EverySet } from "../../../domain/attributeSets.ts";
import { formatMoney, formatNumber, formatPercent, roundOutward, roundTo } from "../../../domain/format.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./everySet.module.css";
import { stepOf } from "./setWords.ts";

export function AveragedPrices({ found }: { readonly found: EverySet }) {
  const { averaged, stacked, currencyCode, listed, current, doubt } = found;
  const step = stepOf(found);
  const own = listed.find(({ set }) => set === current) ?? null;
  const money = (amount: number): string => formatMoney(roundTo(amount, step), currencyCode);
  const range = (one: { low: number; high: number }): string => {
    const { low, high } = roundOutward(one, step);
    return `${formatNumber(low)} – ${formatNumber(high)}`;
  };
  if (averaged === null) {
    return (
      <section aria-labelledby="averaged">
        <SectionHeading id="averaged">Averaged price</SectionHeading>
        <p className={css.note}>
          With coefficients pulled toward zero there is no weight by criterion and no exact range, so prices are not
          averaged.
        </p>
      </section>
    );
  }
  const width = (one: AveragedPrice): string =>
    formatMoney(roundTo(one.addedWidth, Math.max(1, step / 10)), currencyCode);
  const rows: readonly [string, string, string, string][] = [
    [
      "Nine in ten",
      range(averaged),
      stacked === null ? "" : range(stacked),
      own?.low == null || own.high === null ? "" : range({ low: own.low, high: own.high }),
    ],
    ["Doubt about the set adds", width(averaged), stacked === null ? "" : width(stacked), ""],
    [
      "Typical error",
      "",
      stacked === null ? "" : formatPercent(stacked.error, 2),
      own?.error == null ? "" : formatPercent(own.error, 2),
    ],
    [
      "Sets with weight over 0.01",
      formatNumber(averaged.weights.length),
      stacked === null ? "" : formatNumber(stacked.weights.length),
      "1",
    ],
  ];
  return (
    <section aria-labelledby="averaged">
      <SectionHeading id="averaged">Averaged price</SectionHeading>
      <p className={css.average}>{money(averaged.price)}</p>
      <table className={css.averages}>
        <caption className="vh">Price averaged by Akaike weights and by stacking, and of the set in use</caption>
        <thead>
          <tr>
            <td />
            <th scope="col" className="num" title="by AICc: how well each set fits, less what its coefficients cost">
              by AICc
            </th>
            <th scope="col" className="num" title="the mixture that errs least on sales priced without themselves">
              stacked
            </th>
            <th scope="col" className="num">
              set in use
            </th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <th scope="row">Price</th>
            <td className="num">
              <b>{money(averaged.price)}</b>
            </td>
            <td className="num">{stacked === null ? "" : <b>{money(stacked.price)}</b>}</td>
            <td className="num">{own?.price == null ? "" : money(own.price)}</td>
          </tr>
          {rows.map(([label, ...cells]) => (
            <tr key={label}>
              <th scope="row">{label}</th>
              {cells.map((cell, at) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: three columns in a fixed order
                <td key={at} className="num">
                  {cell}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      <p className="small soft">
        By AICc over all sets.{" "}
        {stacked === null
          ? "No mixture could be stacked."
          : `Stacked: the mixture of the ${formatNumber(stacked.over)} best defensible sets that errs least when each sale is priced without itself.`}{" "}
        {doubt}
      </p>
    </section>
  );
}
