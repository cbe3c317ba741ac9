/**
 * Attributes as boxes, what moves together as ties: width is the partial correlation, the others alike; dashed where one rises
 * as the other falls; double line where the dependency is exact. The same as a table below it.
 */
import { useMemo } from "react";
import type { ModelReport } from "../../domain/appraisal.ts";
import { formatNumber } from "../../domain/format.ts";
import css from "./charts.module.css";
import { BOX_HEIGHT, layoutMap, type MapBox } from "./layoutMap.ts";
import { useWidth } from "./useWidth.ts";

export interface MovingTogetherMapProps {
  readonly report: ModelReport;
  /** Attributes shown: key and label, in the order of the rail. */
  readonly attributes: readonly { key: string; label: string }[];
  /** Drawn in brass: left out just now. */
  readonly justNow: string | null;
}

/** A weaker tie says nothing. */
const WEAKEST_TIE = 0.1;
const MOST_TIES = 14;
/** Wider, the ties would be long and say no more. */
const WIDEST = 560;
const NUMBERED_FROM = 0.3;

interface Tie {
  readonly a: string;
  readonly b: string;
  readonly value: number;
  readonly isExact: boolean;
  readonly words: string;
}

function tiesOf(report: ModelReport, labelOf: (key: string) => string): Tie[] {
  const partial = report.movingTogether
    .filter((pair) => Math.abs(pair.partialCorrelation) >= WEAKEST_TIE)
    .slice(0, MOST_TIES)
    .map((pair) => ({
      a: pair.a,
      b: pair.b,
      value: pair.partialCorrelation,
      isExact: false,
      words: `${labelOf(pair.a)} and ${labelOf(pair.b)}: ${formatNumber(pair.partialCorrelation, 2)}, the others alike`,
    }));
  const exact = report.dependencies.flatMap((notice) => {
    const out = notice.resolvedBy?.key ?? notice.attributes[0];
    if (out === undefined) return [];
    return notice.attributes
      .filter((key) => key !== out)
      .map((key) => ({ a: key, b: out, value: 1, isExact: true, words: `${notice.equation}, exact` }));
  });
  return [...partial, ...exact];
}

/** ".65" as an engraver writes it. */
function short(value: number): string {
  return formatNumber(Math.abs(value), 2).replace(/^0/, "");
}

export function MovingTogetherMap({ report, attributes, justNow }: MovingTogetherMapProps) {
  const { box, width: boxWidth } = useWidth<HTMLDivElement>(424);
  const width = Math.min(boxWidth, WIDEST);
  const labelOf = (key: string): string => attributes.find((one) => one.key === key)?.label ?? key;
  const ties = tiesOf(report, labelOf).filter(
    (tie) => attributes.some((one) => one.key === tie.a) && attributes.some((one) => one.key === tie.b),
  );
  const question = JSON.stringify([attributes, ties, width]);
  // biome-ignore lint/correctness/useExhaustiveDependencies: the question holds everything the layout depends on
  const map = useMemo(
    () =>
      layoutMap(
        attributes.map((one) => ({ key: one.key, width: 18 + 6.1 * one.label.length })),
        ties.map((tie) => ({ a: tie.a, b: tie.b, strength: Math.abs(tie.value) })),
        width,
      ),
    [question],
  );
  const placeOf = (key: string): MapBox => map.boxes.find((one) => one.key === key)!;
  const words =
    ties.length === 0 ? "No two attributes move together noticeably." : ties.map((tie) => tie.words).join("; ");
  return (
    <div ref={box} className={css.map}>
      <svg width={width} height={map.height} role="img" aria-label={`Attributes that move together. ${words}`}>
        {ties.map((tie) => (
          <TieLine key={`${tie.a} ${tie.b} ${tie.isExact}`} tie={tie} from={placeOf(tie.a)} to={placeOf(tie.b)} />
        ))}
        {map.boxes.map((one) => (
          <Box
            key={one.key}
            box={one}
            label={labelOf(one.key)}
            isIn={report.attributes.includes(one.key)}
            isJustNow={one.key === justNow}
          />
        ))}
      </svg>
      <TieTable ties={ties} labelOf={labelOf} />
    </div>
  );
}

function TieLine({ tie, from, to }: { tie: Tie; from: MapBox; to: MapBox }) {
  const [mx, my] = [(from.x + to.x) / 2, (from.y + to.y) / 2];
  if (tie.isExact) {
    const length = Math.hypot(to.x - from.x, to.y - from.y) || 1;
    const [ox, oy] = [(-3 * (to.y - from.y)) / length, (3 * (to.x - from.x)) / length];
    return (
      <g>
        <title>{tie.words}</title>
        <path
          d={`M${from.x + ox} ${from.y + oy}L${to.x + ox} ${to.y + oy}M${from.x - ox} ${from.y - oy}L${to.x - ox} ${to.y - oy}`}
          className="s-brick"
          strokeWidth="1.8"
        />
        <rect x={mx - 18} y={my - 8} width="36" height="16" className="f-paper" />
        <text x={mx} y={my + 4} textAnchor="middle">
          exact
        </text>
      </g>
    );
  }
  const size = Math.abs(tie.value);
  return (
    <g>
      <title>{tie.words}</title>
      <path
        d={`M${from.x} ${from.y}L${to.x} ${to.y}`}
        className="s-slate"
        strokeWidth={Math.max(1, 13 * size)}
        strokeDasharray={tie.value < 0 ? "6 4" : undefined}
        opacity={size < NUMBERED_FROM ? 0.75 : 1}
      />
      {size < NUMBERED_FROM ? null : (
        <>
          <rect x={mx - 13} y={my - 8} width="26" height="16" className="f-paper" />
          <text x={mx} y={my + 4} textAnchor="middle">
            {short(tie.value)}
          </text>
        </>
      )}
    </g>
  );
}

function Box({ box, label, isIn, isJustNow }: { box: MapBox; label: string; isIn: boolean; isJustNow: boolean }) {
  const frame = isIn ? "f-raised s-ink" : isJustNow ? "f-paper s-brass" : "f-paper s-edge";
  return (
    <g>
      <rect
        x={box.x - box.width / 2}
        y={box.y - BOX_HEIGHT / 2}
        width={box.width}
        height={BOX_HEIGHT}
        rx="2"
        className={frame}
        strokeWidth={isJustNow ? 1.6 : 1}
        strokeDasharray={isIn ? undefined : "3 3"}
      />
      <text x={box.x} y={box.y + 4} textAnchor="middle" className={isIn ? "" : isJustNow ? "t-brass" : "t-soft"}>
        {label}
      </text>
    </g>
  );
}

function TieTable({ ties, labelOf }: { ties: readonly Tie[]; labelOf: (key: string) => string }) {
  if (ties.length === 0) return null;
  return (
    <details>
      <summary className="fine soft">as a table</summary>
      <table>
        <thead>
          <tr>
            <th scope="col">attributes</th>
            <th scope="col" className="num">
              partial correlation, the others alike
            </th>
          </tr>
        </thead>
        <tbody>
          {ties.map((tie) => (
            <tr key={`${tie.a} ${tie.b} ${tie.isExact}`}>
              <td>{tie.isExact ? tie.words : `${labelOf(tie.a)} and ${labelOf(tie.b)}`}</td>
              <td className="num">{tie.isExact ? "exact" : formatNumber(tie.value, 2)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}
