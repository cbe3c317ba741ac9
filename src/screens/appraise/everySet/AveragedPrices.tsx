/** The price averaged over sets in two ways, beside that of the set in use; doubt about the set is in their ranges. */
import type { AveragedPrice, EverySet } from "../../../domain/attributeSets.ts";
import { formatMoney, formatNumber, formatPercent, roundOutward, roundTo } from "../../../domain/format.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./everySet.module.css";
import { amountStep, fineStepOf } from "./setWords.ts";

export function AveragedPrices({ found }: { readonly found: EverySet }) {
  const { averaged, stacked, currencyCode } = found;
  const money = (amount: number): string => formatMoney(roundTo(amount, fineStepOf(found)), currencyCode);
  const range = (one: AveragedPrice): string => rangeWords(one, found.step);
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
  return (
    <section aria-labelledby="averaged">
      <SectionHeading id="averaged">Averaged price</SectionHeading>
      <p className={css.average}>{formatMoney(roundTo(averaged.price, found.step), currencyCode)}</p>
      <table className={css.averages}>
        <caption className="vh">Price averaged by AICc and by stacking, and of the set in use</caption>
        <thead>
          <tr>
            <td />
            <th scope="col" className="num">
              price
            </th>
            <th scope="col" className="num">
              nine in ten
            </th>
            <th scope="col" className="num">
              error
            </th>
          </tr>
        </thead>
        <tbody>
          <tr title="weights by how well each set fits, less what its coefficients cost (Akaike)">
            <th scope="row">By AICc</th>
            <td className="num">
              <b>{money(averaged.price)}</b>
            </td>
            <td className="num">{range(averaged)}</td>
            <td />
          </tr>
          {stacked === null ? null : (
            <tr title="the mixture that errs least on sales priced without themselves">
              <th scope="row">Stacked</th>
              <td className="num">
                <b>{money(stacked.price)}</b>
              </td>
              <td className="num">{range(stacked)}</td>
              <td className="num">{formatPercent(stacked.error, 2)}</td>
            </tr>
          )}
          <SetInUse found={found} />
        </tbody>
      </table>
      <Doubt found={found} averaged={averaged} />
    </section>
  );
}

function SetInUse({ found }: { readonly found: EverySet }) {
  const own = found.listed.find(({ set }) => set === found.current);
  if (own === undefined || own.price === null) return null;
  const { price, low, high, error } = own;
  return (
    <tr>
      <th scope="row">Set in use</th>
      <td className="num">{formatMoney(roundTo(price, fineStepOf(found)), found.currencyCode)}</td>
      <td className="num">{low === null || high === null ? "" : rangeWords({ low, high }, found.step)}</td>
      <td className="num">{error === null ? "" : formatPercent(error, 2)}</td>
    </tr>
  );
}

function rangeWords(range: { low: number; high: number }, step: number): string {
  const { low, high } = roundOutward(range, step);
  return `${formatNumber(low)}–${formatNumber(high)}`;
}

/** How much the choice of attributes adds to the ranges, and what the two ways of weighing are. */
function Doubt({ found, averaged }: { readonly found: EverySet; readonly averaged: AveragedPrice }) {
  const { stacked, currencyCode, doubt } = found;
  const width = ({ addedWidth }: AveragedPrice): string =>
    addedWidth < 1
      ? `less than ${formatMoney(1, currencyCode)}`
      : formatMoney(roundTo(addedWidth, amountStep([addedWidth])), currencyCode);
  const rows: readonly [string, string, string | null][] = [
    ["Doubt about the set widens the range by", width(averaged), stacked === null ? null : width(stacked)],
    [
      "Sets with weight over 0.01",
      formatNumber(averaged.weights.length),
      stacked === null ? null : formatNumber(stacked.weights.length),
    ],
  ];
  return (
    <>
      <dl className={css.facts}>
        {rows.map(([label, first, second]) => (
          <div key={label}>
            <dt>{label}</dt>
            <dd>{second === null ? first : `${first}, stacked ${second}`}</dd>
          </div>
        ))}
      </dl>
      <p className={`${css.note} small soft`}>
        {stacked === null
          ? ""
          : `Stacked: the mixture of the ${formatNumber(stacked.over)} best defensible sets that errs least when each sale is priced without itself. `}
        {doubt}
      </p>
    </>
  );
}
