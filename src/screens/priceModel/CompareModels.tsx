/** Two attribute sets or two editions side by side: which ones at the left, what differs and why at the right. Prints on one page. */
import { useCallback, useEffect, useMemo, useState } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import type { ComparedCoefficient, ComparedSide, Comparison } from "../../domain/comparison.ts";
import {
  formatDay,
  formatMoney,
  formatNumber,
  formatPercent,
  formatSigned,
  lowerStart,
  niceStep,
  roundTo,
} from "../../domain/format.ts";
import type { Edition, PriceModel } from "../../domain/priceModel.ts";
import { Busy, Button, ErrorNote, SectionHeading, Sentence, StrongMoney } from "../parts/index.ts";
import { isBlank } from "../workbench/blank.ts";
import { useRead } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";
import css from "./compare.module.css";
import { nameOf } from "./ledgerTable.ts";

/** "now", "all" (the whole reference set), or the id of an edition. */
export type SideName = string;

type Side = RequestInput<"compare">["first"];

function sideOf(name: SideName, model: PriceModel): Side {
  if (name === "now") return { model } as unknown as Side;
  if (name === "all") return { model: { ...model, leftOut: [] } } as unknown as Side;
  return { editionId: Number(name) };
}

export interface CompareState {
  readonly editions: readonly Edition[];
  readonly first: SideName;
  readonly second: SideName;
  setFirst(name: SideName): void;
  setSecond(name: SideName): void;
}

export function useCompare(bench: Workbench): CompareState {
  const { client, classId, edition } = bench;
  const ask = useCallback(() => client.ask("listEditions", { classId: classId! }), [client, classId]);
  const { value } = useRead(classId === null ? null : ask);
  const [first, setFirst] = useState<SideName>("all");
  const [second, setSecond] = useState<SideName>("now");
  const latest = edition?.id ?? null;
  useEffect(() => {
    if (latest !== null) setFirst(String(latest));
  }, [latest]);
  return { editions: value ?? [], first, second, setFirst, setSecond };
}

export function CompareChoice({ state }: { state: CompareState }) {
  return (
    <div className={css.choice}>
      <SectionHeading>What is compared</SectionHeading>
      <SidePick label="First" value={state.first} editions={state.editions} onPick={state.setFirst} />
      <SidePick label="Second" value={state.second} editions={state.editions} onPick={state.setSecond} />
      <p className="small soft">
        Leave attributes out on the rail, and the model on the table changes with it. An edition is fitted on the sales
        it was saved with.
      </p>
    </div>
  );
}

interface SidePickProps {
  readonly label: string;
  readonly value: SideName;
  readonly editions: readonly Edition[];
  readonly onPick: (name: SideName) => void;
}

function SidePick({ label, value, editions, onPick }: SidePickProps) {
  return (
    <label className={css.side}>
      <span>{label}</span>
      <select value={value} onChange={(event) => onPick(event.target.value)}>
        <option value="now">the model on the table</option>
        <option value="all">the model on the table, nothing left out</option>
        {editions.map((one) => (
          <option key={one.id} value={String(one.id)}>
            edition {one.number}, {formatDay(one.savedAtUtc.slice(0, 10))}, {formatNumber(one.saleCount)} sales
          </option>
        ))}
      </select>
    </label>
  );
}

export function CompareOutcome({ bench, state }: { bench: Workbench; state: CompareState }) {
  const { client, classId, model, subject, level } = bench;
  const { first, second } = state;
  const ask = useMemo(() => {
    if (classId === null || model === null) return null;
    const priced = subject === null || isBlank(subject) ? null : subject;
    const input = { classId, first: sideOf(first, model), second: sideOf(second, model), subject: priced, level };
    return () => client.ask("compare", input as RequestInput<"compare">);
  }, [client, classId, model, subject, level, first, second]);
  const { value, error } = useRead(ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null) return <Busy words="Fitting both" />;
  return <ComparisonPage comparison={value} />;
}

function ComparisonPage({ comparison }: { comparison: Comparison }) {
  const { sides, currencyCode, headline, cautions, className, subjectTitle } = comparison;
  return (
    <article className={css.page}>
      <div className={css.top}>
        <Sentence>
          <StrongMoney text={headline} />
        </Sentence>
        <Button onClick={() => window.print()}>Print this page</Button>
      </div>
      <p className="small soft">
        {className}
        {subjectTitle === null || subjectTitle === "" ? "" : `, ${subjectTitle}`}. First: {lowerStart(sides[0].name)}.
        Second: {lowerStart(sides[1].name)}.
      </p>
      {cautions.map((caution) => (
        <p key={caution} className="small brass">
          {caution}
        </p>
      ))}
      <div className={css.columns}>
        <Sides sides={sides} currencyCode={currencyCode} />
        <Causes comparison={comparison} />
      </div>
      <Coefficients coefficients={comparison.coefficients} currencyCode={currencyCode} />
      <SalesApart comparison={comparison} />
    </article>
  );
}

function Sides({ sides, currencyCode }: { sides: readonly [ComparedSide, ComparedSide]; currencyCode: string }) {
  const money = (amount: number): string => formatMoney(roundTo(amount, priceStepOf(sides)), currencyCode);
  const rows: readonly [string, (side: ComparedSide) => string][] = [
    ["Price", ({ price }) => (price === null ? "not priced" : money(price.amount))],
    [
      `${Math.round((sides[0].price?.level ?? 0.9) * 100)} % range`,
      ({ price }) => (price === null ? "" : `${money(price.low)} – ${money(price.high)}`),
    ],
    [
      "Typical error",
      ({ looTypicalError }) => (looTypicalError === null ? "not known" : formatPercent(looTypicalError, 1)),
    ],
    ["Explains", ({ r2 }) => (r2 === null ? "" : formatPercent(r2, 1))],
    ["Sales", ({ saleCount }) => formatNumber(saleCount)],
    ["Coefficients", ({ p }) => formatNumber(p)],
    ["Left out", ({ leftOut }) => leftOut.map(({ label }) => lowerStart(label)).join(", ") || "nothing"],
  ];
  return (
    <section>
      <SectionHeading>Side by side</SectionHeading>
      <table className={css.table}>
        <caption className="vh">The two models side by side</caption>
        <thead>
          <tr>
            <td />
            {sides.map((side, at) => (
              <th key={side.name + String(at === 0)} scope="col">
                {side.name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(([label, words]) => (
            <tr key={label}>
              <th scope="row">{label}</th>
              <td>{words(sides[0])}</td>
              <td>{words(sides[1])}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function priceStepOf(sides: readonly [ComparedSide, ComparedSide]): number {
  const widths = sides.flatMap(({ price }) => (price === null ? [] : [price.high - price.low]));
  return widths.length === 0 ? 1 : Math.max(1, niceStep(Math.min(...widths) / 20));
}

function Causes({ comparison }: { comparison: Comparison }) {
  const { causes, sides } = comparison;
  if (causes.length === 0) return null;
  const largest = Math.max(...causes.map(({ amount }) => Math.abs(amount)), 1e-9);
  const step = Math.max(1, priceStepOf(sides) / 10);
  return (
    <section>
      <SectionHeading aside="averaged over the order of the changes">What moves the price</SectionHeading>
      <table className={css.table}>
        <caption className="vh">What moves the price from the first to the second</caption>
        <tbody>
          {causes.map(({ label, amount }) => (
            <tr key={label}>
              <th scope="row">{label}</th>
              <td className={css.bar}>
                <svg width="120" height="10" aria-hidden="true">
                  <path d="M60 0V10" className="s-ink" />
                  <rect
                    x={amount < 0 ? 60 + (amount / largest) * 58 : 60}
                    y="2"
                    width={(Math.abs(amount) / largest) * 58}
                    height="6"
                    fill="var(--slate)"
                  />
                </svg>
              </td>
              <td>{formatSigned(roundTo(amount, step))}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function Coefficients({
  coefficients,
  currencyCode,
}: {
  coefficients: readonly ComparedCoefficient[];
  currencyCode: string;
}) {
  const cell = (amount: number | null, range: { low: number; high: number } | null) => (
    <td
      title={
        range === null
          ? undefined
          : `19 in 20: ${formatMoney(range.low, currencyCode)} to ${formatMoney(range.high, currencyCode)}`
      }
    >
      {amount === null ? <span className="soft">not in</span> : formatSigned(stepped(amount))}
    </td>
  );
  return (
    <section>
      <SectionHeading aside={`${currencyCode} per step at the average sale`}>What each attribute reads</SectionHeading>
      <table className={css.table}>
        <caption className="vh">Coefficients of the two models</caption>
        <thead>
          <tr>
            <td />
            <th scope="col">first</th>
            <th scope="col">second</th>
            <th scope="col">differs by</th>
            <th scope="col" className={css.words}>
              of which carried
            </th>
          </tr>
        </thead>
        <tbody>
          {coefficients.map((one) => (
            <tr key={`${one.attribute} ${one.level ?? ""}`}>
              <th scope="row">
                {nameOf(one)} <span className="soft">{one.stepWords}</span>
              </th>
              {cell(one.first, one.firstRange95)}
              {cell(one.second, one.secondRange95)}
              <td>{one.difference === null ? "" : formatSigned(stepped(one.difference))}</td>
              <td className={css.words}>
                {one.parts
                  .filter((part) => stepped(part.amount) !== 0)
                  .map((part) => `${formatSigned(stepped(part.amount))} for ${lowerStart(part.label)}`)
                  .join(", ")}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function stepped(amount: number): number {
  return roundTo(amount, Math.max(1, Math.min(10, niceStep(Math.abs(amount) / 100))));
}

const PRINTED_SALES = 8;

function SalesApart({ comparison }: { comparison: Comparison }) {
  const { sales, currencyCode, sides } = comparison;
  if (sales.onlyFirst + sales.onlySecond === 0) return null;
  const step = Math.max(1, priceStepOf(sides) / 10);
  return (
    <section>
      <SectionHeading
        aside={`${formatNumber(sales.both)} in both, ${formatNumber(sales.onlyFirst)} only in the first, ${formatNumber(sales.onlySecond)} only in the second`}
      >
        Sales that only one rests on
      </SectionHeading>
      <table className={css.table}>
        <caption className="vh">Sales in one of the two only, those that move its price most first</caption>
        <tbody>
          {sales.listed.slice(0, PRINTED_SALES).map((one) => (
            <tr key={one.sale}>
              <th scope="row">
                {one.title} <span className="soft">{one.reference}</span>
              </th>
              <td>{one.side === 1 ? "first" : "second"}</td>
              <td>{one.soldOn === "" ? "" : formatDay(one.soldOn)}</td>
              <td>{formatMoney(one.price, currencyCode)}</td>
              <td>{one.moves === null ? "" : `moves it ${formatSigned(roundTo(one.moves, step))}`}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
