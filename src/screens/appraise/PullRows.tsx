/** Sales that pull hardest: weight as a bar, what was sold, how it differs, and what the price moves by without it. */
import { useState } from "react";
import type { ModelReport, PricePart, Pull, SourcePull } from "../../domain/appraisal.ts";
import { formatDay, formatNumber, formatSigned, lowerStart, niceStep, roundTo } from "../../domain/format.ts";
import { SectionHeading, TextLink } from "../parts/index.ts";
import css from "./PullRows.module.css";

export interface PullRowsProps {
  readonly priced: PricePart;
  readonly report: ModelReport;
  readonly currencyCode: string;
}

const FEW = 7;
/** Width of the bar of the hardest pull, in pixels. */
const BAR = 44;

export function PullRows({ priced, report, currencyCode }: PullRowsProps) {
  const [isWhole, setIsWhole] = useState(false);
  const { top, restCount, restWeight, sentence, negativeCount } = priced.pull;
  const rows = isWhole ? top : top.slice(0, FEW);
  const numeric = report.attributeEvidence.filter(
    (one) => one.included && one.spread !== null && one.kind !== "market",
  );
  const shown = numeric.slice(0, 2);
  const largest = Math.max(...top.map((one) => Math.abs(one.weight)), Number.MIN_VALUE);
  return (
    <section aria-labelledby="pull-heading">
      <SectionHeading
        id="pull-heading"
        aside={
          top.length > FEW ? (
            <TextLink onPress={() => setIsWhole(!isWhole)}>{isWhole ? `First ${FEW}` : `First ${top.length}`}</TextLink>
          ) : undefined
        }
      >
        Sales that pull hardest
      </SectionHeading>
      <p className={css.note}>
        {sentence}
        {negativeCount > 0 ? ` ${formatNumber(negativeCount)} pull the other way.` : ""}
      </p>
      <div className={css.scroll}>
        <table>
          <caption className="vh">Sales by pull on this price</caption>
          <thead>
            <tr>
              <th scope="col">sale</th>
              <th scope="col">pull, %</th>
              <th scope="col" className="num">
                sold, {currencyCode}
              </th>
              {shown.map((one) => (
                <th scope="col" className="num" key={one.key}>
                  {one.unit === "years" ? "years" : lowerStart(one.label.replace(/ \([^)]*\)$/, ""))}
                </th>
              ))}
              <th scope="col" className="num">
                without it
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map((one) => (
              <Row key={one.sale} pull={one} amount={priced.price.amount} largest={largest} shown={shown} />
            ))}
          </tbody>
        </table>
      </div>
      {restCount > 0 ? (
        <p className="fine soft">
          The other {formatNumber(restCount)} sales weigh {formatNumber(restWeight * 100, 1)} % together.
        </p>
      ) : null}
      <SourceRows sources={priced.pull.bySource ?? []} amount={priced.price.amount} />
    </section>
  );
}

function SourceRows({ sources, amount }: { sources: readonly SourcePull[]; amount: number }) {
  if (sources.length === 0) return null;
  return (
    <div className={css.scroll}>
      <table>
        <caption className="vh">Sources by pull on this price</caption>
        <thead>
          <tr>
            <th scope="col">source</th>
            <th scope="col" className="num">
              sales
            </th>
            <th scope="col" className="num">
              pull, %
            </th>
            <th scope="col" className="num">
              without it
            </th>
          </tr>
        </thead>
        <tbody>
          {sources.map(({ source, count, weight, priceWithout }) => (
            <tr key={source}>
              <th scope="row">{source === "" ? "not stated" : source}</th>
              <td className="num">{formatNumber(count)}</td>
              <td className="num">{formatNumber(weight * 100, 1)}</td>
              <td className="num">
                <b>{priceWithout === undefined ? "" : moveWords(priceWithout, amount)}</b>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function moveWords(priceWithout: number | null, amount: number): string {
  if (priceWithout === null) return "no fit";
  const move = priceWithout - amount;
  const rounded = roundTo(move, Math.max(1, Math.min(10, niceStep(Math.abs(move) / 10))));
  return rounded === 0 ? "±0" : formatSigned(rounded);
}

interface RowProps {
  readonly pull: Pull;
  readonly amount: number;
  readonly largest: number;
  readonly shown: readonly { key: string; decimals: number }[];
}

function Row({ pull, amount, largest, shown }: RowProps) {
  const width = (BAR * Math.abs(pull.weight)) / largest;
  return (
    <tr>
      <th
        scope="row"
        title={`${pull.title}, ${formatDay(pull.soldOn)}, ${pull.channel}${pull.verified ? ", verified" : ""}`}
      >
        {pull.reference ?? pull.sale} <span className="soft">{pull.title}</span>
      </th>
      <td className={css.bar}>
        <svg width={BAR + 30} height="14" aria-hidden="true">
          <rect
            x="0.5"
            y="3.5"
            width={Math.max(1, width)}
            height="7"
            className={pull.weight < 0 ? "f-none s-slate" : "f-slate s-slate"}
          />
          <text x={width + 6} y="11">
            {formatNumber(pull.weight * 100, 1)}
          </text>
        </svg>
        <span className="vh">{formatNumber(pull.weight * 100, 2)}</span>
      </td>
      <td className="num">{formatNumber(pull.price)}</td>
      {shown.map(({ key, decimals }) => (
        <td className="num" key={key}>
          {pull.differences[key] === undefined ? "" : formatSigned(pull.differences[key], Math.min(decimals, 1))}
        </td>
      ))}
      <td className="num">
        <b>{moveWords(pull.priceWithout, amount)}</b>
      </td>
    </tr>
  );
}
