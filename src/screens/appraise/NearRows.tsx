/** The sales most like the subject, each adjusted to it by the model: a check of the price beside the sales that pull hardest. */
import type { ModelReport, NearSale, PricePart } from "../../domain/appraisal.ts";
import {
  formatDay,
  formatNumber,
  formatPercent,
  formatSigned,
  lowerStart,
  niceStep,
  roundTo,
} from "../../domain/format.ts";
import { priceStep } from "../charts/figures.ts";
import { SectionHeading } from "../parts/index.ts";
import css from "./PullRows.module.css";

interface NearRowsProps {
  readonly priced: PricePart;
  readonly report: ModelReport;
  readonly currencyCode: string;
}

export function NearRows({ priced, report, currencyCode }: NearRowsProps) {
  const near = priced.near;
  if (near === undefined || near.sales.length === 0) return null;
  const isLn = report.response === "lnPrice";
  const step = priceStep(priced.price);
  return (
    <section aria-labelledby="near-heading">
      <SectionHeading id="near-heading" aside="least adjusted by the model first">
        Sales most like this item
      </SectionHeading>
      <p className={css.note}>{near.sentence}</p>
      <div className={css.scroll}>
        <table>
          <caption className="vh">Sales most like this item, adjusted to it</caption>
          <thead>
            <tr>
              <th scope="col">sale</th>
              <th scope="col" className="num">
                sold, {currencyCode}
              </th>
              <th scope="col" className="num">
                adjusted by
              </th>
              <th scope="col" className="num">
                comes to
              </th>
              <th scope="col" className="num">
                pull, %
              </th>
            </tr>
          </thead>
          <tbody>
            {near.sales.map((one) => (
              <tr key={one.sale}>
                <th scope="row" title={adjustmentWords(one, isLn)}>
                  {one.reference ?? one.sale} <span className="soft">{one.title}</span>
                </th>
                <td className="num">{formatNumber(one.price)}</td>
                <td className="num">{isLn ? formatPercent(one.gross, 1) : formatNumber(one.gross)}</td>
                <td className="num">
                  <b>{formatNumber(roundTo(one.adjusted, Math.max(1, step / 5)))}</b>
                </td>
                <td className="num">{formatNumber(one.weight * 100, 1)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}

/** "12 May 2025, auction, verified: age +4.1 %, hours −2.0 %" */
function adjustmentWords({ soldOn, channel, verified, adjustments }: NearSale, isLn: boolean): string {
  const amounts = [...adjustments]
    .sort((a, b) => Math.abs(b.amount) - Math.abs(a.amount))
    .map(({ label, amount }) => {
      const size = isLn
        ? `${formatSigned(amount * 100, 1)}\u00a0%`
        : formatSigned(roundTo(amount, niceStep(Math.abs(amount) / 100)));
      return `${lowerStart(label)} ${size}`;
    });
  const about = `${formatDay(soldOn)}, ${channel}${verified ? ", verified" : ""}`;
  return amounts.length === 0 ? `${about}; nothing to adjust` : `${about}: ${amounts.join(", ")}`;
}
