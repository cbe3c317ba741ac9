/** The chosen row and what it carries most, among the sales: a small picture with axes, what it shows in a sentence, and a table. */
import { useMemo } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import type { AttributePair, Ends, PairAxis, PairPicture } from "../../domain/attributePair.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import { isBlank } from "../workbench/blank.ts";
import { useRead } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";
import css from "./PairFigure.module.css";

export interface PairKeys {
  readonly a: string;
  readonly b: string;
}

/** Null keys ask nothing; the picture asked for last stays until the next is there. */
export function usePair(bench: Workbench, keys: PairKeys | null): AttributePair | null {
  const { client, classId, model, subject, assetClass } = bench;
  const dataStamp = assetClass?.dataVersion ?? 0;
  const [a, b] = [keys?.a ?? null, keys?.b ?? null];
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same question changed
  const ask = useMemo(() => {
    if (classId === null || model === null || a === null || b === null) return null;
    const item = subject === null || isBlank(subject) ? null : subject;
    return () => client.ask("pairOf", { classId, model, subject: item, a, b } as RequestInput<"pairOf">);
  }, [client, classId, model, subject, a, b, dataStamp]);
  return useRead(ask).value;
}

const WIDTH = 360;
const HEIGHT = 190;
const LEFT = 46;
const BOTTOM = 34;
const TOP = 10;
const RIGHT = 12;

export function PairFigure({ pair }: { readonly pair: AttributePair }) {
  const { a, b, picture } = pair;
  return (
    <figure className={css.pair}>
      {picture.kind === "levels" ? (
        <LevelDots levels={picture.levels} axis={b} sentence={pair.sentence} />
      ) : (
        <TwoNumbers pair={pair} picture={picture} />
      )}
      <figcaption className="small">
        {pair.sentence}
        <details className="soft">
          <summary>
            {a.label} and {lowerStart(b.label)} as a table
          </summary>
          <PairTable pair={pair} />
        </details>
      </figcaption>
    </figure>
  );
}

type Numbers = Exclude<PairPicture, { kind: "levels" }>;

function TwoNumbers({ pair, picture }: { readonly pair: AttributePair; readonly picture: Numbers }) {
  const { a, b, subject } = pair;
  const [x, y] = endsWith(picture, subject);
  const atX = (value: number): number => LEFT + share(value, x) * (WIDTH - LEFT - RIGHT);
  const atY = (value: number): number => HEIGHT - BOTTOM - share(value, y) * (HEIGHT - BOTTOM - TOP);
  return (
    <svg width={WIDTH} height={HEIGHT} role="img" aria-label={spoken(pair)}>
      <Axes a={a} b={b} x={x} y={y} />
      {picture.kind === "points" ? (
        <g className="f-mid" opacity={picture.points.length > 400 ? 0.35 : 0.6}>
          {picture.points.map(([px, py], i) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: sales have no other name here, and never change places
            <circle key={i} cx={atX(px)} cy={atY(py)} r="1.8" />
          ))}
        </g>
      ) : (
        <Cells picture={picture} atX={atX} atY={atY} />
      )}
      {subject === null ? null : (
        <path
          d={`M${atX(subject[0]) - 6} ${atY(subject[1])}h12M${atX(subject[0])} ${atY(subject[1]) - 6}v12`}
          className={css.subject}
        />
      )}
    </svg>
  );
}

interface CellsProps {
  readonly picture: Extract<PairPicture, { kind: "cells" }>;
  readonly atX: (value: number) => number;
  readonly atY: (value: number) => number;
}

function Cells({ picture: { across, down, counts, x, y }, atX, atY }: CellsProps) {
  const most = Math.max(...counts);
  const wide = (x.high - x.low) / across;
  const high = (y.high - y.low) / down;
  return (
    <g className="f-slate">
      {counts.map((count, k) => {
        if (count === 0) return null;
        const left = x.low + (k % across) * wide;
        const low = y.low + Math.floor(k / across) * high;
        return (
          <rect
            // biome-ignore lint/suspicious/noArrayIndexKey: a cell is its place
            key={k}
            x={atX(left)}
            y={atY(low + high)}
            width={Math.max(1, atX(left + wide) - atX(left))}
            height={Math.max(1, atY(low) - atY(low + high))}
            opacity={0.12 + 0.88 * Math.sqrt(count / most)}
          />
        );
      })}
    </g>
  );
}

function Axes({ a, b, x, y }: { a: PairAxis; b: PairAxis; x: Ends; y: Ends }) {
  const floor = HEIGHT - BOTTOM;
  return (
    <g>
      <path d={`M${LEFT} ${TOP}V${floor}H${WIDTH - RIGHT}`} className="s-edge" fill="none" />
      <text x={LEFT} y={floor + 14} className="t-soft">
        {formatNumber(x.low, a.decimals)}
      </text>
      <text x={WIDTH - RIGHT} y={floor + 14} textAnchor="end" className="t-soft">
        {formatNumber(x.high, a.decimals)}
      </text>
      <text x={(LEFT + WIDTH - RIGHT) / 2} y={floor + 28} textAnchor="middle" className="t-soft">
        {nameOf(a)}
      </text>
      <text x={LEFT - 4} y={floor} textAnchor="end" className="t-soft">
        {formatNumber(y.low, b.decimals)}
      </text>
      <text x={LEFT - 4} y={TOP + 8} textAnchor="end" className="t-soft">
        {formatNumber(y.high, b.decimals)}
      </text>
      <text transform={`translate(12 ${(TOP + floor) / 2}) rotate(-90)`} textAnchor="middle" className="t-soft">
        {nameOf(b)}
      </text>
    </g>
  );
}

interface LevelDotsProps {
  readonly levels: readonly { level: string; count: number; mean: number }[];
  readonly axis: PairAxis;
  readonly sentence: string;
}

const ROW = 17;
const NAMES = 120;
const MOST_LEVELS = 12;

function LevelDots({ levels, axis, sentence }: LevelDotsProps) {
  const shown = levels.slice(0, MOST_LEVELS);
  const scale = {
    low: Math.min(0, ...shown.map(({ mean }) => mean)),
    high: Math.max(...shown.map(({ mean }) => mean)),
  };
  const at = (mean: number): number => NAMES + share(mean, scale) * (WIDTH - NAMES - 60);
  const floor = shown.length * ROW + 4;
  return (
    <svg width={WIDTH} height={floor + 30} role="img" aria-label={sentence}>
      {shown.map(({ level, count, mean }, k) => (
        <g key={level} transform={`translate(0 ${k * ROW + 10})`}>
          <text x={NAMES - 8} y="4" textAnchor="end">
            {level}
          </text>
          <path d={`M${NAMES} 0H${at(mean)}`} className="s-rule" />
          <circle cx={at(mean)} cy="0" r="4" className="f-slate" />
          <text x={at(mean) + 8} y="4" className="t-soft">
            {formatNumber(count)}
          </text>
        </g>
      ))}
      <path d={`M${NAMES} ${floor}H${WIDTH - 60}`} className="s-edge" />
      <text x={NAMES} y={floor + 13} className="t-soft">
        {formatNumber(scale.low, axis.decimals)}
      </text>
      <text x={WIDTH - 60} y={floor + 13} textAnchor="end" className="t-soft">
        {formatNumber(scale.high, axis.decimals)}
      </text>
      <text x={(NAMES + WIDTH - 60) / 2} y={floor + 26} textAnchor="middle" className="t-soft">
        mean {lowerStart(nameOf(axis))}; count of sales beside
      </text>
    </svg>
  );
}

function PairTable({ pair }: { readonly pair: AttributePair }) {
  const { picture, b, a, stepWords } = pair;
  const figure = (value: number | null): string => (value === null ? "none" : formatNumber(value, 2));
  const rows: readonly (readonly [string, string])[] =
    picture.kind === "levels"
      ? picture.levels.map(({ level, count, mean }) => [
          `${a.label} ${level}, ${formatNumber(count)} sales`,
          `mean ${formatNumber(mean, b.decimals)}${b.unit === null ? "" : ` ${b.unit}`}`,
        ])
      : [
          ["Sales", formatNumber(pair.sales)],
          ["Correlation", figure(pair.correlation)],
          ["Correlation, the others in the set alike", figure(pair.partialCorrelation)],
          [`${nameOf(b)} per ${stepWords ?? "step"}, the others alike`, figure(pair.slope)],
        ];
  return (
    <table>
      <tbody>
        {rows.map(([name, value]) => (
          <tr key={name}>
            <th scope="row">{name}</th>
            <td className="num">{value}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function nameOf({ label, unit }: PairAxis): string {
  return unit === null || label.endsWith(`(${unit})`) ? label : `${label}, ${unit}`;
}

function spoken({ a, b, picture, sales, correlation, sentence }: AttributePair): string {
  const drawn = picture.kind === "points" && picture.points.length < sales ? `, ${picture.points.length} drawn` : "";
  const together = correlation === null ? "" : ` Correlation ${formatNumber(correlation, 2)}.`;
  return `${b.label} over ${lowerStart(a.label)} for ${formatNumber(sales)} sales${drawn}.${together} ${sentence}`;
}

function share(value: number, { low, high }: Ends): number {
  return high === low ? 0.5 : (value - low) / (high - low);
}

function endsWith(picture: Numbers, subject: AttributePair["subject"]): [Ends, Ends] {
  const over = (at: 0 | 1, known: Ends | null): Ends => {
    const values = picture.kind === "points" ? picture.points.map((point) => point[at]) : [known!.low, known!.high];
    const all = subject === null ? values : [...values, subject[at]];
    return { low: Math.min(...all), high: Math.max(...all) };
  };
  return picture.kind === "points" ? [over(0, null), over(1, null)] : [over(0, picture.x), over(1, picture.y)];
}
