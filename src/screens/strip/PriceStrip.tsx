/** The price, always on the table: subject, price and its last move, range on the ruler, and whether it is saved. */
import type { ReactNode } from "react";
import type { GlancedPrice, PriceEstimate, PricePart } from "../../domain/appraisal.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import { sentenceOf } from "../../domain/errors.ts";
import { formatDay, formatMoney, formatNumber, listWords, lowerStart, roundTo } from "../../domain/format.ts";
import { priceStep } from "../charts/figures.ts";
import { useWorkbench, type Workbench } from "../workbench/workbench.ts";
import css from "./PriceStrip.module.css";
import { StripGauge } from "./StripGauge.tsx";

export function PriceStrip() {
  const bench = useWorkbench();
  if (bench.assetClass === null) return <section className={css.strip} aria-label="Price strip" />;
  const priced = bench.appraisal?.priced ?? null;
  const price = priced === null ? null : inFront(priced, bench.glanced);
  return (
    <section className={css.strip} aria-label="Price strip">
      <Who bench={bench} />
      {price === null ? (
        <p className={css.why} role="status">
          {bench.error !== null ? sentenceOf(bench.error) : "Not priced yet: give values of the item under Appraise."}
        </p>
      ) : (
        <>
          <Price bench={bench} price={price} currencyCode={bench.assetClass.currencyCode} />
          <StripGauge
            price={price}
            move={bench.move}
            level={bench.level}
            currencyCode={bench.assetClass.currencyCode}
          />
        </>
      )}
      <State bench={bench} />
    </section>
  );
}

/** A glanced price stands in front of the last refined one; it has no range for the average. */
function inFront({ price }: PricePart, glanced: GlancedPrice | null): PriceEstimate {
  return glanced === null ? price : { ...price, ...glanced.price, rangeForAverage: [] };
}

function Who({ bench }: { bench: Workbench }) {
  const { subject, assetClass } = bench;
  if (subject === null) return <div />;
  return (
    <div className={css.who}>
      <span className={css.mark} aria-hidden="true" />
      <div className={css.words}>
        <div className={css.name}>{subject.title === "" ? "No item described" : subject.title}</div>
        <div className="fine soft">{whoWords(bench) ?? `${assetClass?.itemWord ?? "item"} not described yet`}</div>
      </div>
    </div>
  );
}

/** "built 2018 · 4,200 h · at 12 May 2025": year and first number with a unit, as far as known. */
function whoWords({ subject, assetClass }: Workbench): string | null {
  if (subject === null || assetClass === null) return null;
  const attributes = assetClass.attributes.filter((one) => !one.archived);
  const built = attributes.find((one) => one.kind === "built");
  const day = built === undefined ? null : subject.values[built.key];
  const number = attributes.find(
    (one) => one.kind === "number" && one.unit !== null && typeof subject.values[one.key] === "number",
  );
  const value = number === undefined ? null : (subject.values[number.key] as number);
  const parts = [
    typeof day === "string" ? `built ${day.slice(0, 4)}` : null,
    number === undefined || value === null
      ? null
      : `${formatNumber(value, number.decimals)}${number.unit === null ? "" : `\u00a0${number.unit}`}`,
    `at ${formatDay(subject.effectiveOn)}`,
  ];
  return parts.filter((part) => part !== null).join(" · ");
}

function Price({ bench, price, currencyCode }: { bench: Workbench; price: PriceEstimate; currencyCode: string }) {
  const step = priceStep(price);
  const shown = (amount: number): string => formatMoney(roundTo(amount, step), currencyCode);
  const { move } = bench;
  const by = move === null ? 0 : roundTo(move.to, step) - roundTo(move.from, step);
  return (
    <div aria-live="polite" aria-atomic="true">
      <div className={css.price} title={formatMoney(price.amount, currencyCode, undefined, 2)}>
        {bench.glanced === null ? null : <span aria-hidden="true">≈</span>}
        {shown(price.amount)}
      </div>
      {bench.glanced === null ? null : <div className={css.was}>being refined</div>}
      {move === null ? null : (
        <div className={css.was}>
          {by === 0 ? (
            "moves by less than it is rounded to"
          ) : (
            <>
              <span aria-hidden="true">{by > 0 ? "▲ " : "▼ "}</span>
              <span className="vh">{by > 0 ? "up by " : "down by "}</span>
              {formatMoney(Math.abs(by), currencyCode)} from {shown(move.from)}
            </>
          )}
        </div>
      )}
    </div>
  );
}

function State({ bench }: { bench: Workbench }) {
  const { status, edition } = bench;
  const since = edition === null ? "no edition saved yet" : `since edition ${edition.number}`;
  const words: Readonly<Record<typeof status, ReactNode>> = {
    saved: (
      <>
        <b>Edition {edition?.number}</b>, saved
      </>
    ),
    changed:
      edition === null ? (
        <b>No edition yet</b>
      ) : (
        <>
          <b>Changed</b> {since}
        </>
      ),
    refitting: <b>{bench.glanced === null ? "Refitting" : "Being refined"}</b>,
    notPriced: <b>Not priced</b>,
  };
  const dot = { saved: css.saved, changed: css.changed, refitting: css.refitting, notPriced: css.notPriced }[status];
  return (
    <div className={css.state} role="status">
      <div>
        <span className={`${css.dot} ${dot}`} aria-hidden="true" />
        {words[status]}
      </div>
      <div className="fine soft">{countWords(bench)}</div>
    </div>
  );
}

/** "age left out · 597 of 640 sales", or how many attributes are in. */
function countWords({ appraisal, status }: Workbench): string {
  if (appraisal === null) return "";
  const { report, evidence } = appraisal;
  const left = report.leftOut.filter((one) => one.why === "person").map((one) => lowerStart(one.label));
  const isIn = report.attributes.filter((key) => key !== "market" && key !== CHANNEL_KEY).length;
  const first =
    status === "saved" || left.length === 0
      ? `${formatNumber(isIn)} ${isIn === 1 ? "attribute" : "attributes"}`
      : left.length > 2
        ? `${left.length} left out`
        : `${listWords(left)} left out`;
  return `${first} · ${formatNumber(evidence.used)} of ${formatNumber(evidence.read)} sales`;
}
