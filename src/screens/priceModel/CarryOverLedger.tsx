/** The carry-over ledger: picture and numbers in one row each; the row looked at says itself as a sentence below. */
import { useMemo, useState } from "react";
import type { Ledger, ModelReport } from "../../domain/appraisal.ts";
import { formatMoney, formatNumber, formatSigned, lowerStart, roundTo } from "../../domain/format.ts";
import {
  type BarScale,
  barAt,
  barScale,
  barTicks,
  CarryOverBars,
  LaneKey,
  LanePatterns,
} from "../charts/CarryOverBars.tsx";
import { rowStep } from "../charts/figures.ts";
import { useWidth } from "../charts/useWidth.ts";
import { SectionHeading } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { type LedgerColumn, type PrintedRow, printLedger } from "./ledgerTable.ts";
import { PairFigure, type PairKeys, usePair } from "./PairFigure.tsx";
import css from "./PriceModelPlace.module.css";
import { PutInLines, usePutIn } from "./PutInLines.tsx";

interface CarryOverLedgerProps {
  readonly bench: Workbench;
  readonly ledger: Ledger;
  readonly report: ModelReport;
  readonly currencyCode: string;
}

/** Room the words and numbers of a row take; the picture gets the rest. */
const WORDS_WIDTH = 215;
const NUMBER_WIDTH = 76;
/** In a narrower pane the range gives way; it stays on hover of what the row reads. */
const NARROW = 640;

export function CarryOverLedger({ bench, ledger, report, currencyCode }: CarryOverLedgerProps) {
  const { columns, rows } = useMemo(() => printLedger(ledger), [ledger]);
  const { box, width } = useWidth<HTMLDivElement>(900);
  const [chosenId, choose] = useState<string | null>(null);
  const hasRange = width >= NARROW;
  const numbers = NUMBER_WIDTH * (columns.length + (hasRange ? 3 : 2));
  const picture = Math.min(640, Math.max(110, width - WORDS_WIDTH - numbers));
  const scale = barScale(
    rows.map((row) => row.parts),
    picture,
  );
  const chosen = rows.find((row) => row.id === chosenId) ?? hottest(rows);
  const pair = usePair(bench, pairKeys(chosen));
  const coming = usePutIn(bench, report.averagePrice, ledger.leftOutOwn.length > 0);
  if (rows.length === 0) return null;
  return (
    <>
      <LanePatterns />
      <SectionHeading aside={<Legend columns={columns} />}>Carry-over ledger</SectionHeading>
      <div ref={box} className={css.scroll}>
        <table className={css.ledger}>
          <LedgerHead
            columns={columns}
            scale={scale}
            currencyCode={currencyCode}
            averagePrice={report.averagePrice}
            hasRange={hasRange}
          />
          <tbody>
            {rows.map((row) => (
              <LedgerRowView
                key={row.id}
                row={row}
                columns={columns}
                scale={scale}
                currencyCode={currencyCode}
                hasRange={hasRange}
                isChosen={row.id === chosen?.id}
                onChoose={() => choose(row.id)}
              />
            ))}
          </tbody>
        </table>
      </div>
      <p className="small" style={{ marginTop: 8 }} aria-live="polite">
        {chosen?.sentence}
      </p>
      {chosen?.rangeWords == null ? null : (
        <p className="fine soft">
          {currencyCode}, 95&nbsp;% ranges: {chosen.rangeWords}.
        </p>
      )}
      {pair === null || chosen?.carriesFor == null ? null : <PairFigure pair={pair} />}
      <LeftOutOwn ledger={ledger} currencyCode={currencyCode} />
      {coming === null || ledger.leftOutOwn.length === 0 ? null : <PutInLines bench={bench} found={coming} />}
    </>
  );
}

function pairKeys(row: PrintedRow | undefined): PairKeys | null {
  return row === undefined || row.carriesFor === null ? null : { a: row.attribute, b: row.carriesFor };
}

function hottest(rows: readonly PrintedRow[]): PrintedRow | undefined {
  const carried = (row: PrintedRow): number => Math.max(0, ...row.parts.slice(1).map(Math.abs));
  return rows.reduce<PrintedRow | undefined>(
    (best, row) => (best === undefined || carried(row) > carried(best) ? row : best),
    undefined,
  );
}

function Legend({ columns }: { columns: readonly LedgerColumn[] }) {
  return (
    <>
      <span className={css.legend}>
        <LaneKey lane={0} />
        own part, beside the whole set
      </span>
      {columns.map((column, index) => (
        <span key={column.heading} className={css.legend}>
          <LaneKey lane={index === 0 ? 1 : 2} />
          carried for {column.label}
        </span>
      ))}
      <span className={css.legend}>
        <svg width="4" height="10" style={{ display: "inline-block", marginRight: 5 }} aria-hidden="true">
          <path d="M2 0V10" className="s-ink" strokeWidth="2.4" />
        </svg>
        reads now
      </span>
    </>
  );
}

interface LedgerHeadProps {
  readonly columns: readonly LedgerColumn[];
  readonly scale: BarScale;
  readonly currencyCode: string;
  readonly averagePrice: number;
  readonly hasRange: boolean;
}

function LedgerHead({ columns, scale, currencyCode, averagePrice, hasRange }: LedgerHeadProps) {
  return (
    <thead>
      <tr>
        <th scope="col">
          {currencyCode} per unit, at the average sale of {formatMoney(roundTo(averagePrice, 10), currencyCode)}
        </th>
        <th className={css.picture}>
          <svg width={scale.width} height="20" aria-hidden="true">
            {barTicks(scale).map((tick) => (
              <g key={tick}>
                <path d={`M${barAt(scale, tick)} 16v4`} className="s-edge" />
                <text x={barAt(scale, tick)} y="12" textAnchor="middle" className="t-soft">
                  {formatNumber(tick)}
                </text>
              </g>
            ))}
          </svg>
        </th>
        {columns.length === 0 ? null : (
          <th scope="col" className="num">
            own part
          </th>
        )}
        {columns.map((column) => (
          <th key={column.heading} scope="col" className="num" title={`carried for ${column.label}`}>
            {column.heading.length > 14 ? `${column.heading.slice(0, 12)}…` : column.heading}
          </th>
        ))}
        <th scope="col" className="num">
          reads now
        </th>
        {hasRange ? (
          <th scope="col" className="num">
            range, 95&nbsp;%
          </th>
        ) : null}
      </tr>
    </thead>
  );
}

interface LedgerRowViewProps {
  readonly row: PrintedRow;
  readonly columns: readonly LedgerColumn[];
  readonly scale: BarScale;
  readonly currencyCode: string;
  readonly hasRange: boolean;
  readonly isChosen: boolean;
  readonly onChoose: () => void;
}

function LedgerRowView({ row, columns, scale, currencyCode, hasRange, isChosen, onChoose }: LedgerRowViewProps) {
  const exact = (amount: number): string => formatMoney(amount, currencyCode, undefined, 2);
  const range = row.range === null ? "none can be given" : `${exact(row.range.low)} to ${exact(row.range.high)}`;
  const within = (index: number): string =>
    row.partRanges[index] == null ? "" : `, range, 95\u00a0%: ${row.partRanges[index]}`;
  const spoken = [
    `own part ${formatNumber(row.printed[0]!)}`,
    ...columns.map((column, index) => `carried for ${column.label} ${formatNumber(row.printed[index + 1]!)}`),
    `reads ${formatNumber(row.reads)}`,
  ];
  return (
    <tr className={isChosen ? css.chosen : undefined} onMouseEnter={onChoose}>
      <th scope="row">
        <button type="button" className={css.row} aria-pressed={isChosen} onFocus={onChoose} onClick={onChoose}>
          {row.name} <span className="fine soft">{row.step}</span>
        </button>
      </th>
      <td className={css.picture}>
        <CarryOverBars parts={row.parts} scale={scale} label={`${row.name}: ${spoken.join(", ")}`} />
      </td>
      {columns.length === 0 ? null : (
        <td className="num" title={`${exact(row.parts[0]!)}${within(0)}`}>
          {formatNumber(row.printed[0]!)}
          <span className="vh">{within(0)}</span>
        </td>
      )}
      {columns.map((column, index) => (
        <td
          key={column.heading}
          className={`num ${row.mostCarried === index ? css.carried : ""}`}
          title={`${exact(row.parts[index + 1]!)}${within(index + 1)}`}
        >
          {row.printed[index + 1] === 0 ? "±0" : formatSigned(row.printed[index + 1]!)}
          <span className="vh">{within(index + 1)}</span>
        </td>
      ))}
      <td className={`num ${css.now}`} title={`${exact(row.exactReads)}; range, 95\u00a0%: ${range}`}>
        {formatNumber(row.reads)}
        {row.signTurned ? <span className="vh">, the sign has turned</span> : null}
      </td>
      {hasRange ? (
        <td className="num soft" title={range}>
          {row.halfRange === null ? "none" : `±\u00a0${formatNumber(row.halfRange)}`}
        </td>
      ) : null}
    </tr>
  );
}

/** What the left-out attributes say beside the whole reference set. */
function LeftOutOwn({ ledger, currencyCode }: { ledger: Ledger; currencyCode: string }) {
  if (ledger.leftOutOwn.length === 0) {
    return <p className="small soft">Parts are rounded to add up.</p>;
  }
  const step = (amount: number): number => rowStep({ own: amount, coefficient: amount });
  return (
    <p className="small soft" style={{ marginTop: 4 }}>
      Left out, beside the whole set:{" "}
      {ledger.leftOutOwn.map((one, index) => (
        <span key={`${one.key} ${one.level ?? ""}`}>
          {index === 0 ? "" : "; "}
          {lowerStart(one.label)}
          {one.level === null || one.level === "yes" ? "" : `, ${one.level}`}{" "}
          <span className="money" title={formatMoney(one.money, currencyCode, undefined, 2)}>
            {formatSigned(roundTo(one.money, step(one.money)))}
          </span>{" "}
          ({one.stepWords})
        </span>
      ))}
      . Parts are rounded to add up.
    </p>
  );
}
