/**
 * One mark for every attribute set: price across, typical error on a sale not yet seen down. The sets that count lie above the
 * dashed line; the set in use stands in verdigris, that of the edition as a brass diamond. Pointing at a mark names its set,
 * a click or Enter makes it the set in use; arrow keys go through the sets by price and by error.
 */
import { type KeyboardEvent, type PointerEvent, useEffect, useMemo, useRef, useState } from "react";
import type { Span } from "../../domain/attributeSets.ts";
import { formatMoney, formatNumber, formatPercent, roundTo } from "../../domain/format.ts";
import { drawSetMarks } from "./drawSetMarks.ts";
import css from "./EverySetStrip.module.css";
import { FamilyNames } from "./FamilyNames.tsx";
import {
  errorTicks,
  type Frame,
  inOrder,
  nearestSet,
  partingAttributes,
  priceTicks,
  type SetMarks,
  type SetScale,
  setScale,
} from "./setScale.ts";
import { useWidth } from "./useWidth.ts";

export interface EverySetStripProps {
  readonly marks: SetMarks;
  readonly current: number;
  /** The set of the saved edition where it is another one. */
  readonly edition: { readonly set: number; readonly name: string } | null;
  /** Errors up to here count. */
  readonly limit: number;
  readonly count: number;
  readonly ruleWords: string;
  /** Lowest and highest price of the sets that count; null while they are being found. */
  readonly span: Span | null;
  readonly step: number;
  /** Step of the price in use, as it stands elsewhere. */
  readonly ownStep: number;
  /** Finer, for telling one set from another. */
  readonly fineStep: number;
  readonly currencyCode: string;
  nameOf(set: number): string;
  onChoose(set: number): void;
}

const HEIGHT = 340;
const REACH = 16;

export function EverySetStrip(props: EverySetStripProps) {
  const { marks, current, limit, nameOf, onChoose } = props;
  const { box, width } = useWidth<HTMLDivElement>(940);
  const [pointed, setPointed] = useState<number | null>(null);
  const frame: Frame = { left: 44, right: width - 2, top: 34, bottom: HEIGHT - 26 };
  // biome-ignore lint/correctness/useExhaustiveDependencies: the frame follows from the width
  const scale = useMemo(() => setScale(marks, frame), [marks, width]);
  const parting = useMemo(() => partingAttributes(marks), [marks]);
  const orders = useMemo(() => ({ price: inOrder(marks.price), error: inOrder(marks.error) }), [marks]);
  const canvas = useMarksDrawn(scale, marks, parting, limit, width);
  if (scale === null) return null;
  const shown = pointed ?? current;
  const words = (set: number): string => markWords(props, set, nameOf(set));
  const point = (event: PointerEvent<HTMLDivElement>): number | null => {
    const { left, top } = event.currentTarget.getBoundingClientRect();
    return nearestSet(marks, scale, { x: event.clientX - left, y: event.clientY - top }, REACH);
  };
  const press = (event: KeyboardEvent): void => {
    const next = stepped(event.key, shown, orders);
    if (next !== null) setPointed(next);
    else if ((event.key === "Enter" || event.key === " ") && pointed !== null) onChoose(pointed);
    else if (event.key === "Escape") setPointed(null);
    else return;
    event.preventDefault();
  };
  return (
    <div
      ref={box}
      className={css.strip}
      style={{ height: HEIGHT, cursor: pointed === null ? "default" : "pointer" }}
      role="slider"
      tabIndex={0}
      aria-label="Attribute sets by price; Enter makes the one named the set in use"
      aria-valuemin={1}
      aria-valuemax={orders.price.length}
      aria-valuenow={orders.price.indexOf(shown) + 1}
      aria-valuetext={words(shown)}
      onPointerMove={(event) => setPointed(point(event))}
      onPointerLeave={() => setPointed(null)}
      onClick={(event) => {
        const set = point(event as unknown as PointerEvent<HTMLDivElement>);
        if (set !== null) onChoose(set);
      }}
      onKeyDown={press}
      onBlur={() => setPointed(null)}
    >
      <svg width={width} height={HEIGHT} aria-hidden="true" className={css.layer}>
        <Grid scale={scale} frame={frame} limit={limit} width={width} />
      </svg>
      <canvas ref={canvas} className={css.layer} style={{ width, height: HEIGHT }} />
      <svg width={width} height={HEIGHT} aria-hidden="true" className={css.layer}>
        <FamilyNames marks={marks} scale={scale} parting={parting} frame={frame} limit={limit} />
        <Band {...props} scale={scale} frame={frame} />
        <Named {...props} scale={scale} frame={frame} />
        {pointed === null ? null : <Ring marks={marks} scale={scale} set={pointed} />}
      </svg>
      {pointed === null ? null : <Tip marks={marks} scale={scale} set={pointed} words={words(pointed)} width={width} />}
    </div>
  );
}

function markWords({ marks, fineStep, currencyCode }: EverySetStripProps, set: number, name: string): string {
  const price = marks.price[set];
  const error = marks.error[set];
  if (typeof price !== "number") return `${name}: not priced`;
  const money = formatMoney(roundTo(price, fineStep), currencyCode);
  return `${name}: ${money}${typeof error === "number" ? `, error ${formatPercent(error, 1)}` : ""}`;
}

type Orders = Readonly<Record<"price" | "error", readonly number[]>>;

/** Right and left go by price, down and up by error. */
function stepped(key: string, from: number, orders: Orders): number | null {
  const moves: Readonly<Record<string, readonly ["price" | "error", number]>> = {
    ArrowRight: ["price", 1],
    ArrowLeft: ["price", -1],
    ArrowDown: ["error", 1],
    ArrowUp: ["error", -1],
  };
  const move = moves[key];
  if (move !== undefined) return orders[move[0]][orders[move[0]].indexOf(from) + move[1]] ?? from;
  if (key === "Home") return orders.price[0] ?? null;
  return key === "End" ? (orders.price.at(-1) ?? null) : null;
}

/** Draws on change of marks, width and colours; the theme is watched on the page itself. */
function useMarksDrawn(
  scale: SetScale | null,
  marks: SetMarks,
  parting: readonly number[],
  limit: number,
  width: number,
) {
  const canvas = useRef<HTMLCanvasElement | null>(null);
  useEffect(() => {
    const element = canvas.current;
    if (element === null || scale === null) return;
    const paint = (): void => {
      const style = getComputedStyle(element);
      const colours = {
        defensible: style.getPropertyValue("--ink").trim(),
        other: style.getPropertyValue("--slate-mid").trim(),
      };
      drawSetMarks(element, { width, height: HEIGHT }, marks, scale, parting, limit, colours);
    };
    paint();
    const watch = new MutationObserver(paint);
    watch.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    return () => watch.disconnect();
  }, [scale, marks, parting, limit, width]);
  return canvas;
}

interface PartProps {
  readonly scale: SetScale;
  readonly frame: Frame;
}

function Grid({ scale, frame, limit, width }: PartProps & { readonly limit: number; readonly width: number }) {
  const { left, right, top, bottom } = frame;
  const edge = Math.min(bottom, scale.y(limit));
  return (
    <>
      <rect x={left} y={top} width={right - left} height={edge - top} className="f-raised" />
      {errorTicks(scale).map((error) => (
        <g key={error}>
          <path d={`M${left} ${scale.y(error)}H${right}`} className="s-rule" />
          <text x={left - 6} y={scale.y(error) + 4} textAnchor="end" className="t-soft">
            {formatPercent(error, error < 0.1 && (error * 100) % 1 > 0.01 ? 1 : 0)}
          </text>
        </g>
      ))}
      <path d={`M${left} ${bottom}H${right}`} className="s-edge" />
      {priceTicks(scale, right - left).map(({ amount, rank }) => {
        const x = scale.x(amount);
        return (
          <g key={amount}>
            <path d={`M${x} ${bottom}v${rank === 2 ? 7 : rank === 1 ? 5 : 3}`} className="s-edge" />
            {rank === 2 && x > left + 18 && x < width - 24 ? (
              <text x={x} y={bottom + 21} textAnchor="middle" className="t-soft">
                {formatNumber(amount)}
              </text>
            ) : null}
          </g>
        );
      })}
    </>
  );
}

/** The line below which sets do not count, and the bracket of the prices of those that do. */
function Band({ scale, frame, limit, count, ruleWords, span, step, currencyCode }: EverySetStripProps & PartProps) {
  const { left, right, top, bottom } = frame;
  const y = Math.min(bottom, scale.y(limit));
  const title = `${formatNumber(count)} defensible ${count === 1 ? "set" : "sets"}`;
  const ends = span === null ? null : { low: scale.x(span.low), high: scale.x(span.high) };
  const room = ends === null ? right - left : ends.low - left - 66;
  const bracket = top + 13;
  const isBeside = room > 330;
  const money = (steps: number): string => formatMoney(steps * step, currencyCode);
  return (
    <>
      <path d={`M${left} ${y}H${right}`} className="s-ink" strokeDasharray="5 3" />
      {isBeside ? null : <rect x={right - 306} y={y - 19} width="306" height="18" className="f-raised" />}
      <text
        x={isBeside || ends === null ? left + 6 : right - 6}
        y={isBeside ? bracket + 4 : y - 6}
        textAnchor={isBeside || ends === null ? "start" : "end"}
        className="halo"
      >
        <tspan className="t-b">{title}</tspan>: {ruleWords}
      </text>
      {ends === null || span === null ? null : (
        <>
          <path
            d={`M${ends.low} ${bracket - 5}v10M${ends.low} ${bracket}H${ends.high}M${ends.high} ${bracket - 5}v10`}
            className="s-ink f-none"
            strokeWidth="1.4"
          />
          <BracketEnd
            x={ends.low}
            y={bracket}
            side={-1}
            room={ends.low - left}
            text={money(Math.floor(span.low / step))}
          />
          <BracketEnd
            x={ends.high}
            y={bracket}
            side={1}
            room={right - ends.high}
            text={money(Math.ceil(span.high / step))}
          />
        </>
      )}
    </>
  );
}

interface BracketEndProps {
  readonly x: number;
  readonly y: number;
  /** −1: to the left of the bracket. */
  readonly side: 1 | -1;
  readonly room: number;
  readonly text: string;
}

/** Beside the bracket, or over its end where there is no room. */
function BracketEnd({ x, y, side, room, text }: BracketEndProps) {
  const fits = room > text.length * 7 + 10;
  const isStart = (side === 1) === fits;
  return (
    <text
      x={fits ? x + side * 7 : x}
      y={fits ? y + 4 : y + 20}
      textAnchor={isStart ? "start" : "end"}
      className="t-b halo"
    >
      {text}
    </text>
  );
}

/** The set in use with its price on top, and the edition's. */
function Named(props: EverySetStripProps & PartProps) {
  const { marks, current, edition, scale, frame, ownStep, currencyCode } = props;
  const price = marks.price[current];
  const error = marks.error[current];
  const isMarked = typeof price === "number" && typeof error === "number";
  const x = isMarked ? scale.x(price) : frame.left;
  const isFar = x > frame.right - 330;
  return (
    <>
      <text x={4} y={20} className="t-soft">
        {isFar && x < 640 ? "error" : "typical error on a sale not yet seen"}
      </text>
      {isMarked ? (
        <>
          <path d={`M${x} ${frame.top - 6}V${frame.bottom}`} className="s-verd" strokeDasharray="1 3" />
          <rect x={x - 2} y={scale.y(error) - 9} width="4" height="18" className="f-verd" />
          <text x={x} y={20} textAnchor={isFar ? "end" : "middle"} className="t-verd t-serif" style={{ fontSize: 16 }}>
            {formatMoney(roundTo(price, ownStep), currencyCode)}
          </text>
          <text x={isFar ? x - 62 : x + 38} y={20} textAnchor={isFar ? "end" : "start"} className="t-soft halo">
            in use, {props.nameOf(current)}: {formatPercent(error, 1)}
          </text>
        </>
      ) : null}
      {edition === null ? null : <EditionMark {...props} set={edition.set} name={edition.name} />}
    </>
  );
}

function EditionMark(props: EverySetStripProps & PartProps & { readonly set: number; readonly name: string }) {
  const { marks, scale, frame, set, name, fineStep, currencyCode } = props;
  const price = marks.price[set];
  const error = marks.error[set];
  if (typeof price !== "number" || typeof error !== "number") return null;
  const [x, y] = [scale.x(price), scale.y(error)];
  const isFar = x > frame.right - 200;
  return (
    <>
      <path d={`M${x} ${y - 6}l6 6l-6 6l-6 -6Z`} className="f-brass s-paper" />
      <text x={isFar ? x - 11 : x + 11} y={y + 4} textAnchor={isFar ? "end" : "start"} className="t-brass halo">
        <tspan className="t-b">{name}</tspan> {formatMoney(roundTo(price, fineStep), currencyCode)},{" "}
        {formatPercent(error, 1)}
      </text>
    </>
  );
}

function Ring({ marks, scale, set }: { readonly marks: SetMarks; readonly scale: SetScale; readonly set: number }) {
  const price = marks.price[set];
  const error = marks.error[set];
  if (typeof price !== "number" || typeof error !== "number") return null;
  return <circle cx={scale.x(price)} cy={scale.y(error)} r="7" className="s-verd f-none" strokeWidth="1.6" />;
}

interface TipProps {
  readonly marks: SetMarks;
  readonly scale: SetScale;
  readonly set: number;
  readonly words: string;
  readonly width: number;
}

function Tip({ marks, scale, set, words, width }: TipProps) {
  const price = marks.price[set];
  const error = marks.error[set];
  if (typeof price !== "number" || typeof error !== "number") return null;
  const [x, y] = [scale.x(price), scale.y(error)];
  const side = x > width / 2 ? { right: width - x + 12 } : { left: x + 12 };
  return (
    <div className={`${css.tip} raised small`} style={{ ...side, top: y > HEIGHT - 80 ? y - 44 : y + 10 }}>
      {words}
    </div>
  );
}
