/** Left of every attribute set: which sets count, those that weigh most, and what putting each attribute in does to the price. */
import type { EverySet, ListedSet, SetSwitch } from "../../../domain/attributeSets.ts";
import { hasAttribute, setName } from "../../../domain/attributeSets.ts";
import { formatNumber, formatPercent, formatSigned, listWords, lowerStart, roundTo } from "../../../domain/format.ts";
import { Busy, SectionHeading } from "../../parts/index.ts";
import css from "./everySet.module.css";
import { HoldChoices } from "./HoldChoices.tsx";
import { amountStep, fineStepOf } from "./setWords.ts";
import type { EverySetState } from "./useEverySet.ts";

export function SetsPane({ state }: { readonly state: EverySetState }) {
  const { found, error } = state;
  if (found === null) return error === null ? <Busy words="Fitting every set" /> : null;
  return (
    <div className={css.pane} aria-busy={state.isAwaited}>
      <WhichCount state={state} found={found} />
      <HoldChoices state={state} found={found} />
      <HeavySets state={state} found={found} />
      <Switches found={found} />
    </div>
  );
}

const MOST_SHARE = 60;

function WhichCount({ state, found }: { readonly state: EverySetState; readonly found: EverySet }) {
  const percent = Math.round(state.share * 100);
  return (
    <section aria-labelledby="which-count">
      <SectionHeading id="which-count">Which sets count</SectionHeading>
      <label className={css.slider}>
        <span>Error within</span>
        <input
          type="range"
          min={0}
          max={MOST_SHARE}
          step={1}
          value={percent}
          aria-valuetext={`${percent} % of the best`}
          onChange={(event) => state.setShare(Number(event.target.value) / 100)}
        />
        <b>{percent} % of the best</b>
      </label>
      <p className="small soft">{countWords(found)}</p>
      {found.cautions.map((caution) => (
        <p key={caution} className="small brass">
          {caution}
        </p>
      ))}
    </section>
  );
}

function countWords({ attributes, sales, notKnown, alwaysIn, heldOut = [], errorKind }: EverySet): string {
  const k = attributes.length;
  const each = `${formatNumber(k)} attributes known for this item can be in or out: ${formatNumber(2 ** k)} sets, all on the same ${formatNumber(sales)} sales.`;
  const names = (some: EverySet["alwaysIn"]) => listWords(some.map(({ label }) => lowerStart(label)));
  const always = alwaysIn.length === 0 ? "" : ` In each: ${names(alwaysIn)}.`;
  const held = heldOut.length === 0 ? "" : ` In none, by wish: ${names(heldOut)}.`;
  const never = notKnown.length === 0 ? "" : ` Sets with ${names(notKnown)} cannot price it.`;
  const how = errorKind === "leave-one-out" ? "" : " Errors: each tenth of the sales priced by the rest.";
  return `${each}${always}${held}${never}${how}`;
}

const SHOWN = 8;

function HeavySets({ state, found }: { readonly state: EverySetState; readonly found: EverySet }) {
  const { attributes, listed, current } = found;
  const step = fineStepOf(found);
  const hasWeights = found.averaged !== null;
  const top = listed.slice(0, SHOWN);
  const own = listed.find(({ set }) => set === current);
  const rows = own === undefined || top.includes(own) ? top : [...top.slice(0, SHOWN - 1), own];
  return (
    <section aria-labelledby="heavy-sets">
      <SectionHeading id="heavy-sets" aside={<DotKey />}>
        {hasWeights ? "Sets that weigh most" : "Sets that err least"}
      </SectionHeading>
      <table className={css.sets} data-crowd={attributes.length > 10}>
        <thead>
          <tr>
            {attributes.map(({ key, label }) => (
              <th key={key} scope="col" className={css.turned}>
                <span title={label}>{shortLabel(label)}</span>
              </th>
            ))}
            <th scope="col" className="num">
              price
            </th>
            <th scope="col" className="num">
              error, %
            </th>
            {hasWeights ? (
              <th scope="col" className="num">
                weight
              </th>
            ) : null}
          </tr>
        </thead>
        <tbody>
          {rows.map((one) => (
            <SetRow key={one.set} one={one} found={found} step={step} onChoose={state.choose} />
          ))}
        </tbody>
      </table>
    </section>
  );
}

interface SetRowProps {
  readonly one: ListedSet;
  readonly found: EverySet;
  readonly step: number;
  readonly onChoose: (set: number) => void;
}

function SetRow({ one, found, step, onChoose }: SetRowProps) {
  const isCurrent = one.set === found.current;
  return (
    <tr data-current={isCurrent}>
      {found.attributes.map(({ key }, g) => (
        <td key={key} className={css.dot}>
          <Dot isIn={hasAttribute(one.set, g)} />
          <span className="vh">{hasAttribute(one.set, g) ? "in" : "left out"}</span>
        </td>
      ))}
      <td className="num">
        <button
          type="button"
          className={css.choose}
          aria-pressed={isCurrent}
          title={isCurrent ? "The set in use" : `Use the set ${setName(found, one.set)}`}
          onClick={() => onChoose(one.set)}
        >
          {one.price === null ? "not priced" : formatNumber(roundTo(one.price, step))}
        </button>
      </td>
      <td className="num">{one.error === null ? "" : formatNumber(one.error * 100, 2)}</td>
      {one.weight === null ? null : <td className="num">{formatNumber(one.weight, 2)}</td>}
    </tr>
  );
}

function Dot({ isIn }: { readonly isIn: boolean }) {
  return (
    <svg width="11" height="11" aria-hidden="true">
      {isIn ? <circle cx="5.5" cy="5.5" r="5" /> : <circle cx="5.5" cy="5.5" r="4.6" className={css.out} />}
    </svg>
  );
}

function DotKey() {
  return (
    <span className={css.key}>
      <Dot isIn /> in <Dot isIn={false} /> left out
    </span>
  );
}

/** "Air conditioning" → "Air condit…" */
function shortLabel(label: string): string {
  const plain = label.replace(/\s*\(.*\)$/, "");
  return plain.length > 12 ? `${plain.slice(0, 11).trimEnd()}…` : plain;
}

function Switches({ found }: { readonly found: EverySet }) {
  const { switches, currencyCode, movesMost } = found;
  const rows = switches.filter(({ mean }) => mean !== null).sort((a, b) => Math.abs(b.mean!) - Math.abs(a.mean!));
  if (rows.length === 0) return null;
  const step = amountStep(rows.map(({ mean }) => mean!));
  const ends = rows.flatMap(({ span }) => (span === null ? [] : [span.low, span.high]));
  const scale = { low: Math.min(0, ...ends), high: Math.max(0, ...ends) };
  const pairs = rows[0]!.pairs;
  return (
    <section aria-labelledby="switches">
      <SectionHeading id="switches">What putting it in does to the price</SectionHeading>
      <table>
        <caption className="vh">
          Change of the price when an attribute is put into a set, lowest, mean and highest
        </caption>
        <thead>
          <tr>
            <td />
            <th scope="col">
              {currencyCode}, {formatNumber(pairs)} pairs each
            </th>
            <th scope="col" className="num">
              mean
            </th>
            <th scope="col" className="num">
              defensible
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((one) => (
            <tr key={one.key}>
              <th scope="row">{one.key === movesMost ? <b>{one.label}</b> : one.label}</th>
              <td title={spanWords(one, step)}>
                <SwitchBar one={one} scale={scale} />
              </td>
              <td className="num">{formatSigned(roundTo(one.mean!, step))}</td>
              <td className="num soft">{defensibleWords(one, step)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {movesMost === null ? null : <p className={`${css.note} small soft`}>{moveWords(found, step)}</p>}
    </section>
  );
}

function defensibleWords({ meanDefensible, inDefensible }: SetSwitch, step: number): string {
  if (inDefensible === "always") return "always in";
  if (inDefensible === "never") return "never in";
  return meanDefensible === null ? "no pair" : formatSigned(roundTo(meanDefensible, step));
}

function spanWords({ span }: SetSwitch, step: number): string | undefined {
  if (span === null) return undefined;
  return `from ${formatSigned(roundTo(span.low, step))} to ${formatSigned(roundTo(span.high, step))}`;
}

function moveWords({ switches, movesMost, marks, current, attributes, currencyCode }: EverySet, step: number): string {
  const one = switches.find(({ key }) => key === movesMost)!;
  const now = marks.price[current]!;
  const isIn = hasAttribute(
    current,
    attributes.findIndex(({ key }) => key === movesMost),
  );
  const move = roundTo(one.priceSwitched! - now, step);
  const percent = formatPercent(Math.abs(one.priceSwitched! / now - 1), 1);
  return `From the set in use, ${isIn ? "leaving out" : "putting in"} ${lowerStart(one.label)} moves the price most: ${formatSigned(move)} ${currencyCode} (${percent}).`;
}

const BAR = 108;

function SwitchBar({ one, scale }: { readonly one: SetSwitch; readonly scale: { low: number; high: number } }) {
  const extent = scale.high - scale.low || 1;
  const at = (amount: number): number => 2 + ((amount - scale.low) / extent) * (BAR - 4);
  const mean = one.mean!;
  const [from, to] = mean < 0 ? [at(mean), at(0)] : [at(0), at(mean)];
  return (
    <svg width={BAR} height="14" aria-hidden="true">
      {one.span === null ? null : <path d={`M${at(one.span.low)} 7H${at(one.span.high)}`} className="s-mid" />}
      <rect
        x={from}
        y="3.5"
        width={Math.max(0.8, to - from)}
        height="7"
        className={mean < 0 ? "f-paper s-slate" : "f-slate s-slate"}
      />
      <path d={`M${at(0)} 0V14`} className="s-soft" />
    </svg>
  );
}
