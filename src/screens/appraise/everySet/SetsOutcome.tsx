/** Right of every attribute set: the sentence, the strip of all sets, spans of coefficients, averaged prices and shares. */
import { useCallback, useMemo, useState } from "react";
import { type EverySet, setName } from "../../../domain/attributeSets.ts";
import { formatMoney, formatNumber, formatPercent, roundTo } from "../../../domain/format.ts";
import type { Edition } from "../../../domain/priceModel.ts";
import { EverySetStrip } from "../../charts/EverySetStrip.tsx";
import { priceStep } from "../../charts/figures.ts";
import { Busy, ErrorNote, Sentence, StrongMoney } from "../../parts/index.ts";
import type { Workbench } from "../../workbench/workbench.ts";
import { AveragedPrices } from "./AveragedPrices.tsx";
import css from "./everySet.module.css";
import { SharesView } from "./SharesView.tsx";
import { SpanBars } from "./SpanBars.tsx";
import { countWithin, fineStepOf } from "./setWords.ts";
import type { EverySetState } from "./useEverySet.ts";

export function SetsOutcome({ bench, state }: { readonly bench: Workbench; readonly state: EverySetState }) {
  if (state.error !== null) return <ErrorNote error={state.error} />;
  if (state.found === null) return <Busy words="Fitting every set" />;
  return <Found bench={bench} state={state} found={state.found} />;
}

interface FoundProps {
  readonly bench: Workbench;
  readonly state: EverySetState;
  readonly found: EverySet;
}

function Found({ bench, state, found }: FoundProps) {
  const { share } = state;
  const isSettled = found.rule.kind === "error" && found.rule.share === share;
  const within = useMemo(() => countWithin(found, share), [found, share]);
  const marks = useMemo(() => ({ attributes: found.attributes, ...found.marks }), [found]);
  const priced = bench.appraisal?.priced ?? null;
  const ownStep = priced === null ? found.step : priceStep(priced.price);
  const nameOf = useCallback((set: number) => setName(found, set), [found]);
  return (
    <div className={css.outcome} aria-busy={state.isAwaited}>
      <Sentence>
        <StrongMoney text={found.headline} />
      </Sentence>
      <figure>
        <EverySetStrip
          marks={marks}
          current={found.current}
          edition={editionSet(found, bench.edition)}
          limit={within.limit}
          count={isSettled ? found.defensible.length : within.count}
          ruleWords={`error within ${Math.round(share * 100)} % of the best`}
          span={isSettled ? found.price : null}
          step={found.step}
          ownStep={ownStep}
          fineStep={fineStepOf(found)}
          currencyCode={found.currencyCode}
          nameOf={nameOf}
          onChoose={state.choose}
        />
        <figcaption className="small soft">
          Each mark is one attribute set: its price across, its error down (the best sets get more room). A click makes
          it the set in use.
        </figcaption>
        <SetTable found={found} />
      </figure>
      <div className={css.two}>
        <SpanBars found={found} />
        <AveragedPrices found={found} />
      </div>
      <SharesView found={found} />
    </div>
  );
}

/** The set of the saved edition where it differs from the one in use. */
function editionSet(
  { attributes, heldIn = [], heldOut = [], current }: EverySet,
  edition: Edition | null,
): { set: number; name: string } | null {
  if (edition === null) return null;
  const { leftOut } = edition.model;
  const has = (key: string) => edition.model.attributes.some((one) => one.key === key) && !leftOut.includes(key);
  if (heldIn.some(({ key }) => !has(key)) || heldOut.some(({ key }) => has(key))) return null;
  const set = attributes.reduce((sum, { key }, g) => sum + (key.includes("*") || has(key) ? 2 ** g : 0), 0);
  return set === current ? null : { set, name: `edition ${edition.number}` };
}

const TABLED = 100;

function SetTable({ found }: { readonly found: EverySet }) {
  const [isOpen, setOpen] = useState(false);
  return (
    <details className="small" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>As a table</summary>
      {isOpen ? <SetRows found={found} /> : null}
    </details>
  );
}

function SetRows({ found }: { readonly found: EverySet }) {
  const { marks, currencyCode, defensible, current } = found;
  const step = fineStepOf(found);
  const priced = [...marks.price.keys()].filter((set) => marks.price[set] !== null && marks.error[set] !== null);
  const sets = priced.sort((a, b) => marks.error[a]! - marks.error[b]!);
  const counts = new Set(defensible);
  return (
    <table className={css.tabled}>
      <caption className="small soft">
        {sets.length > TABLED
          ? `The ${TABLED} sets of ${formatNumber(sets.length)} that err least`
          : "All sets, least error first"}
      </caption>
      <thead>
        <tr>
          <th scope="col">set</th>
          <th scope="col" className="num">
            price
          </th>
          <th scope="col" className="num">
            typical error
          </th>
          <th scope="col">counts</th>
        </tr>
      </thead>
      <tbody>
        {sets.slice(0, TABLED).map((set) => (
          <tr key={set}>
            <th scope="row">
              {setName(found, set)}
              {set === current ? ", in use" : ""}
            </th>
            <td className="num">{formatMoney(roundTo(marks.price[set]!, step), currencyCode)}</td>
            <td className="num">{formatPercent(marks.error[set]!, 1)}</td>
            <td>{counts.has(set) ? "defensible" : ""}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
