/** Who speaks for what is left out: the rows that carry most, with a way to the whole ledger. */
import type { Appraisal, LedgerRow } from "../../domain/appraisal.ts";
import {
  formatNumber,
  formatSigned,
  listWords,
  lowerStart,
  niceStep,
  roundTo,
  roundToAddUp,
} from "../../domain/format.ts";
import { SectionHeading, StrongMoney, TextLink } from "../parts/index.ts";
import css from "./PullRows.module.css";

const SHOWN = 3;

function carriedOf(row: LedgerRow): number {
  return row.money.carried.reduce((sum, part) => sum + part.amount, 0);
}

/** Own, carried and total, rounded so that they add up as printed. */
function printed(row: LedgerRow): { own: number; carried: number; reads: number } {
  const largest = Math.max(Math.abs(row.money.own), Math.abs(row.money.coefficient), 1);
  const step = Math.max(1, Math.min(10, niceStep(largest / 100)));
  const [own, carried] = roundToAddUp([row.money.own, carriedOf(row)], row.money.coefficient, step);
  return { own: own!, carried: carried!, reads: roundTo(row.money.coefficient, step) };
}

export function LedgerTeaser({ appraisal }: { readonly appraisal: Appraisal }) {
  const { ledger, assetClass } = appraisal;
  const most = [...ledger.rows].sort((a, b) => Math.abs(carriedOf(b)) - Math.abs(carriedOf(a))).slice(0, SHOWN);
  const names = listWords(ledger.leftOut.map((one) => lowerStart(one.label)));
  return (
    <section aria-labelledby="teaser-heading">
      <SectionHeading id="teaser-heading" aside={<TextLink href="#/price-model">Open the ledger</TextLink>}>
        {ledger.leftOut.length === 0 ? "Every attribute speaks for itself" : `Who carries the ${names}`}
      </SectionHeading>
      <p className={css.note}>
        <StrongMoney text={ledger.headline} />
      </p>
      {ledger.leftOut.length === 0 ? null : (
        <table>
          <caption className="vh">The attributes that carry most for what is left out</caption>
          <thead>
            <tr>
              <th scope="col">{assetClass.currencyCode}, at the average sale</th>
              <th scope="col" className="num">
                own
              </th>
              <th scope="col" className="num">
                carried
              </th>
              <th scope="col" className="num">
                reads
              </th>
            </tr>
          </thead>
          <tbody>
            {most.map((row) => {
              const { own, carried, reads } = printed(row);
              return (
                <tr key={`${row.attribute} ${row.level}`} title={row.sentence}>
                  <th scope="row">
                    {row.level === null ? row.label : `${row.label} ${row.level}`}{" "}
                    <span className="soft">{row.stepWords}</span>
                  </th>
                  <td className="num">{formatNumber(own)}</td>
                  <td className="num">{formatSigned(carried)}</td>
                  <td className="num">
                    <b>{formatNumber(reads)}</b>
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      )}
    </section>
  );
}
