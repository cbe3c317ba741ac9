/** What each attribute accounts for: of the spread in the sales, and of this item's distance from the average price. */
import type { AttributeShare, AttributeShares, EverySet } from "../../../domain/attributeSets.ts";
import { formatNumber, formatPercent, formatSigned, roundTo } from "../../../domain/format.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./everySet.module.css";
import { amountStep } from "./setWords.ts";

export function SharesView({ found }: { readonly found: EverySet }) {
  const { shares, sharesRefused } = found;
  return (
    <section aria-labelledby="shares">
      <SectionHeading id="shares" aside="spread in these sales, not cause">
        What each attribute accounts for
      </SectionHeading>
      {shares === null ? <p className={css.note}>{sharesRefused}</p> : <Shares found={found} shares={shares} />}
    </section>
  );
}

function Shares({ found, shares }: { readonly found: EverySet; readonly shares: AttributeShares }) {
  const rows = [...shares.shares].sort((a, b) => b.r2 - a.r2);
  return (
    <>
      <p className={css.note}>{shares.sentences.join(" ")}</p>
      <table className={css.shares}>
        <caption className="vh">Shares of explained variation and of the distance from the average price</caption>
        <thead>
          <tr>
            <td />
            <th scope="col">of the spread, last in to alone</th>
            <th scope="col" className="num" title="averaged over all orders; ± one standard error, by jackknife">
              share ± error
            </th>
            <th scope="col" className={`num ${css.wide}`}>
              alone
            </th>
            <th scope="col" className={`num ${css.wide}`}>
              last in
            </th>
            {shares.distance === null ? null : <DistanceHeads found={found} />}
          </tr>
        </thead>
        <tbody>
          {rows.map((one) => (
            <ShareRow key={one.key} one={one} found={found} shares={shares} />
          ))}
          <Totals found={found} shares={shares} />
        </tbody>
      </table>
    </>
  );
}

function DistanceHeads({ found }: { readonly found: EverySet }) {
  const unit = found.response === "lnPrice" ? "% of price" : found.currencyCode;
  return (
    <>
      <th scope="col" className="num" title="averaged over all orders in which attributes can come in">
        this item,
        <br />
        averaged, {unit}
      </th>
      <th scope="col" className="num" title="its own coefficient times its distance from the average">
        plain rule,
        <br />
        {unit}
      </th>
    </>
  );
}

interface RowProps {
  readonly one: AttributeShare;
  readonly found: EverySet;
  readonly shares: AttributeShares;
}

function ShareRow({ one, found, shares }: RowProps) {
  const of = (part: number): string => formatPercent(part / shares.r2);
  return (
    <tr>
      <th scope="row">{one.label}</th>
      <td>
        <ShareBar one={one} shares={shares} />
      </td>
      <td className="num">
        <b>{of(one.r2)}</b>
        {one.r2Error === null ? null : (
          <span className="soft fine"> ± {formatNumber((100 * one.r2Error) / shares.r2)}</span>
        )}
      </td>
      <td className={`num soft ${css.wide}`}>{of(one.r2Alone)}</td>
      <td className={`num soft ${css.wide}`}>{of(one.r2Last)}</td>
      {one.distance === null ? null : (
        <>
          <td className="num">{distanceWords(found, shares, one.distance)}</td>
          <td className="num">{distanceWords(found, shares, one.additive)}</td>
        </>
      )}
    </tr>
  );
}

/** In ln models as percent, which multiply up; else in money, which adds up. */
function distanceWords({ response }: EverySet, { shares, distance }: AttributeShares, part: number | null): string {
  if (part === null) return "";
  if (response === "lnPrice") return formatSigned(100 * Math.expm1(part), 1);
  return formatSigned(roundTo(part, amountStep([distance ?? 0, ...shares.map((one) => one.distance ?? 0)])));
}

function Totals({ found, shares }: { readonly found: EverySet; readonly shares: AttributeShares }) {
  const { alwaysIn, r2, distance } = shares;
  const additive = shares.shares.reduce((sum, one) => sum + (one.additive ?? 0), 0);
  const first = found.alwaysIn.map(({ label }) => label).join(", ");
  return (
    <>
      {found.alwaysIn.length === 0 ? null : (
        <tr>
          <th scope="row">
            {first} <span className="soft fine">first</span>
          </th>
          <td />
          <td className="num">{formatPercent(alwaysIn.r2 / r2)}</td>
          <td className={css.wide} />
          <td className={css.wide} />
          {distance === null ? null : (
            <>
              <td className="num">{distanceWords(found, shares, alwaysIn.distance)}</td>
              <td className="num">{distanceWords(found, shares, distance - additive)}</td>
            </>
          )}
        </tr>
      )}
      <tr className={css.total}>
        <th scope="row">Together</th>
        <td className="soft">R² {formatNumber(r2, 3)}</td>
        <td className="num">100{"\u00a0"}%</td>
        <td className={css.wide} />
        <td className={css.wide} />
        {distance === null ? null : (
          <>
            <td className="num">{distanceWords(found, shares, distance)}</td>
            <td className="num">{distanceWords(found, shares, distance)}</td>
          </>
        )}
      </tr>
    </>
  );
}

const BAR = 160;

/** The bar is the share; the thin line runs from what it adds last to what it has alone. */
function ShareBar({ one, shares }: { readonly one: AttributeShare; readonly shares: AttributeShares }) {
  const largest = Math.max(...shares.shares.map(({ r2, r2Alone, r2Last }) => Math.max(r2, r2Alone, r2Last)), 1e-12);
  const at = (part: number): number => (Math.max(0, part) / largest) * (BAR - 2);
  return (
    <svg width={BAR} height="14" aria-hidden="true">
      <rect y="3" width={Math.max(1, at(one.r2))} height="8" className="f-slate" />
      <path
        d={`M${at(one.r2Last)} 7H${at(one.r2Alone)}M${at(one.r2Last)} 4v6M${at(one.r2Alone)} 4v6`}
        className="s-mid f-none"
        strokeWidth="1.2"
      />
    </svg>
  );
}
